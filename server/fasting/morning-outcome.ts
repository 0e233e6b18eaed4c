import type { MorningOutcome } from '../../shared/contracts/family-morning';
import type { FamilyWords } from './family-words';
import type { HouseholdNight } from './household-night';
import { isAboutFood, toldAtOf, type ToldRow } from './told-rows';

/** A phone that sends at once has its answer here within this time. */
const atOnceMs = 2 * 60_000;

/**
 * What the family was told last, with what it told us about each child: always by the newest answer, whichever came
 * in last. Null when nothing was told yet.
 */
export function standingOutcome(
  night: HouseholdNight,
  rows: readonly ToldRow[],
  words: FamilyWords,
): MorningOutcome | null {
  const newest = rows.at(-1);
  if (!newest) return null;
  const receivedAt = newest.received_at.getTime();
  const toldAt = toldAtOf(newest);
  const time = words.time(receivedAt);
  return {
    receivedAt: newest.received_at.toISOString(),
    kind: newest.said.outcome.kind,
    heading: newest.said.outcome.heading,
    lines: [...newest.said.outcome.lines],
    receivedSays:
      receivedAt - toldAt > atOnceMs
        ? words.text('outcome.received-later', { answeredTime: words.time(toldAt), time })
        : words.text('outcome.received', { time }),
    youToldUs: night.children.flatMap(({ morningId, childId }) => {
      const row = newestTold(rows, morningId);
      return row ? [{ morningId, childId, says: row.said.toldUs }] : [];
    }),
    canChangeUntil: new Date(night.questionClosesAt).toISOString(),
  };
}

/** "Not coming" and "ill" replace what was said about food; "late" stands beside it. */
function newestTold(rows: readonly ToldRow[], morningId: number): ToldRow | undefined {
  const ofChild = rows.filter((row) => row.morning_id === morningId);
  return ofChild.filter(({ answer }) => answer !== 'late').at(-1) ?? ofChild.at(-1);
}

export const newestFood = (rows: readonly ToldRow[], morningId: number): ToldRow | undefined =>
  rows.filter((row) => row.morning_id === morningId && isAboutFood(row.answer)).at(-1);
