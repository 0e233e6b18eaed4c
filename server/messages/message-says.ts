import type { MessageItem } from '../../shared/contracts/messages';

type State = MessageItem['state'];

export interface SaidState {
  readonly state: State;
  readonly attempts: number;
  readonly failureSays: string | null;
  readonly isDue: boolean;
}

/** The state of a message in a complete sentence for staff. */
export function stateSays({ state, attempts, failureSays, isDue }: SaidState): string {
  const why = failureSays === null ? '' : ` ${failureSays}`;
  switch (state) {
    case 'queued':
      if (attempts > 0) return `Tried ${times(attempts)}; it will be tried again.${why}`;
      return isDue ? 'On its way.' : 'Waits for its time.';
    case 'sending':
      return 'On its way.';
    case 'sent':
      return 'Sent; no report yet that it arrived.';
    case 'delivered':
      return 'Arrived.';
    case 'failed':
      return `It did not arrive.${why}`;
    case 'given-up':
      return `Given up after ${times(attempts)}.${why}`;
    case 'withdrawn':
      return 'Taken back before it was sent.';
  }
}

const times = (count: number): string => (count === 1 ? '1 try' : `${count} tries`);

const codeKinds: ReadonlySet<string> = new Set(['code', 'sign-in-code']);

/**
 * What staff may read of a message. A sign-in code and the secret part of a link open a family's page; they are for the
 * family alone.
 */
export function shownBody(kind: string, body: string): string {
  if (codeKinds.has(kind)) return body.replace(/\d{6}/g, '••••••');
  return body.replace(/(\/[im]\/)[A-Za-z0-9_-]{16,}/g, '$1…');
}

export function healthSays(health: {
  readonly waiting: number;
  readonly oldestDueAt: number | null;
  readonly isStuck: boolean;
  readonly now: number;
}): string {
  const { waiting, oldestDueAt, isStuck, now } = health;
  if (waiting === 0 || oldestDueAt === null) return 'Everything that was due has gone out.';
  const minutes = Math.max(0, Math.floor((now - oldestDueAt) / 60_000));
  const count = waiting === 1 ? '1 message is' : `${waiting} messages are`;
  return isStuck
    ? `Nothing goes out: ${count} due, the oldest for ${minutes} minutes. Call the families and tell the administrator.`
    : `${count} on the way.`;
}
