/**
 * How a computed result was reached, as data: the rule that was applied and what went into it.
 * Inputs are minutes, days, local times, instants (epoch milliseconds) or versions; the name of
 * each says which. Staff read `says`, which the server adds in their language.
 */
export interface Explanation {
  /** A stable key of the rule, by matter: 'specimen.receipt-at-cut-off'. */
  readonly rule: string;
  readonly inputs: Readonly<Record<string, string | number | null>>;
  readonly says?: string;
}
