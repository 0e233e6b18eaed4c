import { createHash } from 'node:crypto';
import type { MessageKind } from '../../shared/domain/message-plan';
import type { Instant } from '../../shared/domain/zone';
import { familyStopTime } from '../../shared/languages/family-time';
import type { Wording, WordingParams } from '../wording/render';

/** A message of a household and day before it is queued. */
export interface DraftMessage {
  readonly kind: MessageKind;
  readonly channel: 'sms' | 'mail';
  readonly familyMemberId: number;
  readonly address: string;
  readonly language: string;
  readonly isWithoutConsent: boolean;
  readonly wordingVersions: Readonly<Record<string, number>>;
  readonly subject: string | null;
  readonly body: string;
  /** The same told as news, for who has heard something else before; null where it needs no other words. */
  readonly bodyOfNews: string | null;
  /** What it says apart from its words: other facts are told again, other words are not. */
  readonly facts: readonly (string | number | null)[];
  readonly callReason: string | null;
  readonly dueAt: number;
  readonly lastUsefulAt: number;
}

/** Wording that remembers which texts were used, for their versions and sign-offs. */
export interface NotedWording {
  readonly wording: Wording;
  text(key: string, params?: WordingParams): string;
  used(): string[];
}

export function noting(wording: Wording): NotedWording {
  const used = new Set<string>();
  return {
    wording,
    text: (key, params) => {
      used.add(key);
      return wording.text(key, params);
    },
    used: () => [...used],
  };
}

/** '1:00 at night', and which of the two on the night when the clock shows it twice. */
export function stopTimeSays(noted: NotedWording, stopAt: Instant, zone: string): string {
  const { time, occurs } = familyStopTime(stopAt, zone, noted.wording.profile);
  return occurs === 'once' ? time : noted.text(`time.${occurs}`, { time });
}

const hashOf = (content: unknown): string =>
  createHash('sha256').update(JSON.stringify(content)).digest('hex').slice(0, 8);

/** What a message tells to whom: the same facts in other words are the same. */
export const factsOf = ({ address, facts }: DraftMessage): string => hashOf([address, facts]);

/**
 * One key for each content: a night planned again with the same outcome queues nothing, another content replaces what
 * still waits. `news` counts what the person heard before with other facts, so that a plan that goes back to what it
 * was is told once more.
 */
export function dedupeKeyOf(
  householdId: number,
  on: string,
  draft: DraftMessage,
  news: number,
): string {
  const words = hashOf([draft.subject ?? '', draft.body, draft.dueAt]);
  const content = `${factsOf(draft)}-${words}${news > 0 ? `-${news}` : ''}`;
  return `${draft.kind}:${householdId}:${on}:${draft.familyMemberId}:${draft.channel}:${content}`;
}

/** The facts in a key of `dedupeKeyOf`. */
export const factsInKey = (key: string): string => key.split(':')[5]?.split('-')[0] ?? '';
