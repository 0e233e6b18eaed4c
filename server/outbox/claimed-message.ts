/** A message in the hands of one sender. */
export interface ClaimedMessage {
  readonly id: number;
  readonly kind: string;
  readonly channel: 'sms' | 'mail';
  readonly householdId: number | null;
  readonly familyMemberId: number | null;
  readonly staffId: number | null;
  readonly address: string;
  readonly subject: string | null;
  readonly body: string;
  readonly calendar: string | null;
  readonly calendarMethod: 'REQUEST' | 'CANCEL' | 'PUBLISH' | null;
  readonly callReason: string | null;
  readonly morningOn: string | null;
  readonly isWithoutConsent: 0 | 1;
  readonly dueAt: Date;
  readonly lastUsefulAt: Date;
  readonly createdAt: Date;
  /** Counted before the attempt, so that a crash counts too. */
  readonly attempts: number;
}
