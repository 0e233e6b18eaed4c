import { createHash } from 'node:crypto';
import type { Instant } from '../../shared/domain/zone';
import { familyStopTime } from '../../shared/languages/family-time';
import type { Wording, WordingParams } from '../wording/render';

/** A message of a household and day before it is queued. */
export interface DraftMessage {
  readonly kind: 'evening' | 'reminder' | 'morning';
  readonly channel: 'sms' | 'mail';
  readonly familyMemberId: number;
  readonly address: string;
  readonly language: string;
  readonly wordingVersions: Readonly<Record<string, number>>;
  readonly subject: string | null;
  readonly body: string;
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

/**
 * One key for each content: a night planned again with the same outcome queues nothing, another content replaces what
 * still waits.
 */
export function dedupeKeyOf(householdId: number, on: string, draft: DraftMessage): string {
  const content = [draft.channel, draft.address, draft.subject ?? '', draft.body, draft.dueAt];
  const hash = createHash('sha256').update(JSON.stringify(content)).digest('hex').slice(0, 8);
  return `${draft.kind}:${householdId}:${on}:${draft.familyMemberId}:${draft.channel}:${hash}`;
}
