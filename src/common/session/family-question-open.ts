/** @param now epoch milliseconds by the clinic's clock */
export function isQuestionOpen(
  question: { opensAt: string; closesAt: string } | null,
  now: number,
): boolean {
  return (
    question !== null && Date.parse(question.opensAt) <= now && now < Date.parse(question.closesAt)
  );
}
