/** A text that came in, as the provider reports it. */
export interface IncomingText {
  /** The provider's id of the text; the same text reported twice is taken once. */
  readonly providerId: string;
  /** E.164. */
  readonly from: string;
  readonly body: string;
  /** Pictures that came with it; they are not kept. */
  readonly pictures?: number;
  /** Epoch milliseconds of the business clock. */
  readonly receivedAt: number;
}

/** What became of a text: kept with it, and told to the clinic. */
export type ReplyOutcome =
  | 'answered'
  | 'not-coming'
  | 'too-early'
  | 'too-late'
  | 'no-morning'
  | 'unclear'
  | 'unknown-number'
  | 'opted-out'
  | 'opted-in'
  | 'help'
  | 'repeat';
