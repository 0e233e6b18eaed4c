import type { MessageItem } from '../../shared/contracts/messages';
import type { ClinicWords } from '../wording/clinic-words';

type State = MessageItem['state'];

export interface SaidState {
  readonly state: State;
  readonly attempts: number;
  /** As the sender kept it, in English. */
  readonly failureSays: string | null;
  readonly isDue: boolean;
}

/** The state of a message in a complete sentence for staff. */
export function stateSays(words: ClinicWords, said: SaidState): string {
  const { state, attempts, failureSays, isDue } = said;
  const withFailure = (says: string): string =>
    failureSays === null
      ? says
      : words.text('clinic.message.with-failure', { says, failure: words.sentence(failureSays) });
  switch (state) {
    case 'queued':
      if (attempts > 0) return withFailure(words.text('clinic.message.tried-again', { attempts }));
      return words.text(isDue ? 'clinic.message.on-its-way' : 'clinic.message.waits');
    case 'sending':
      return words.text('clinic.message.on-its-way');
    case 'failed':
      return withFailure(words.text('clinic.message.failed'));
    case 'given-up':
      return withFailure(words.text('clinic.message.given-up', { attempts }));
    case 'sent':
    case 'delivered':
    case 'withdrawn':
      return words.text(`clinic.message.${state}`);
  }
}

export const kindSays = (words: ClinicWords, kind: string): string =>
  words.text(
    words.has(`clinic.message.kind.${kind}`)
      ? `clinic.message.kind.${kind}`
      : 'clinic.message.kind.other',
  );

const codeKinds: ReadonlySet<string> = new Set(['code', 'sign-in-code']);

/**
 * What staff may read of a message. A sign-in code and the secret part of a link open a family's page; they are for the
 * family alone.
 */
export function shownBody(kind: string, body: string): string {
  if (codeKinds.has(kind)) return body.replace(/\d{6}/g, '••••••');
  return body.replace(/(\/[im]\/)[A-Za-z0-9_-]{16,}/g, '$1…');
}

export function healthSays(
  words: ClinicWords,
  health: {
    readonly waiting: number;
    readonly oldestDueAt: number | null;
    readonly isStuck: boolean;
    readonly failures: number;
    readonly now: number;
  },
): string {
  const { waiting, oldestDueAt, isStuck, failures, now } = health;
  if (!isStuck && failures > 0) return words.text('clinic.outbox.failures', { count: failures });
  if (waiting === 0 || oldestDueAt === null) return words.text('clinic.outbox.all-out');
  const minutes = Math.max(0, Math.floor((now - oldestDueAt) / 60_000));
  return words.text(isStuck ? 'clinic.outbox.stuck' : 'clinic.outbox.on-the-way', {
    count: waiting,
    minutes,
  });
}
