/**
 * How an attempt ended without a plain yes.
 * - 'refused': never will, for this message or address: no further attempt.
 * - 'later': was certainly not taken; another attempt may succeed.
 * - 'unknown': may or may not have been taken; a text is looked up before it is sent again.
 */
export type FailureKind = 'refused' | 'later' | 'unknown';

export class DeliveryFailure extends Error {
  constructor(
    readonly kind: FailureKind,
    /** The provider's own code where it gave one, else a word of ours. */
    readonly code: string,
    says: string,
  ) {
    super(says);
    this.name = 'DeliveryFailure';
  }
}
