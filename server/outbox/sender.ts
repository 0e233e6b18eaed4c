import { randomBytes } from 'node:crypto';
import type { Logger } from 'pino';
import type { Sequelize } from 'sequelize';
import { DeliveryFailure } from '../channels/delivery-failure';
import type { MailChannel } from '../channels/mail/mail-channel';
import type { SentText, SmsChannel } from '../channels/sms/sms-channel';
import type { Clock } from '../clock/clock';
import { claimAbandoned, claimMessages } from './claim';
import type { ClaimedMessage } from './claimed-message';
import { applyDeliveryReports } from './delivery-reports';
import type { GiveUp } from './give-up';
import { pace } from './pace';
import { recover } from './recover';
import { keepInDoubt, settleFailed, settleSent, type Settling } from './settle';

export interface SenderParts {
  readonly db: Sequelize;
  readonly clock: Clock;
  readonly log: Logger;
  readonly sms: SmsChannel;
  readonly mail: MailChannel;
  readonly giveUp: GiveUp;
  /** How long a claim lasts by the real clock; longer than any attempt may take. */
  readonly claimLastsMs?: number;
  readonly atOnce?: number;
  readonly perSecond?: { readonly sms: number; readonly mail: number };
}

export interface Sender {
  /** Takes what is due, up to the free hands, and begins to send it. @returns how many it took. */
  tick(): Promise<number>;
  /** Waits until it could take something; at once while a hand is free. */
  handFree(): Promise<void>;
  /** Ticks until nothing is due and nothing is in flight. */
  drain(): Promise<void>;
  /** Waits for what is in flight. */
  settled(): Promise<void>;
}

const attemptLastsAtMostMs = 25_000;
const reportsEveryMs = 1_000;
const abandonedEveryMs = 1_000;

export function createSender(parts: SenderParts): Sender {
  const { db, clock, log, giveUp } = parts;
  const claimLastsMs = parts.claimLastsMs ?? 60_000;
  const atOnce = parts.atOnce ?? 5;
  const claimedBy = `${process.pid}-${randomBytes(8).toString('hex')}`;
  const paces = {
    sms: pace(parts.perSecond?.sms ?? 10),
    mail: pace(parts.perSecond?.mail ?? 10),
  };
  const inFlight = new Set<Promise<void>>();
  let reportsAppliedAt = 0;
  let abandonedSoughtAt = 0;
  const settling = (): Settling => ({ db, giveUp, claimedBy, now: clock.now() });

  function begin(work: Promise<void>, message: ClaimedMessage): void {
    const guarded = work
      .catch((error: unknown) => {
        // The row stays claimed; when the claim runs out it is looked up like after a crash.
        log.error({ err: error, messageId: message.id }, 'A message could not be settled');
      })
      .finally(() => inFlight.delete(guarded));
    inFlight.add(guarded);
  }

  async function send(message: ClaimedMessage, claimedUntil: number): Promise<void> {
    await paces[message.channel].turn();
    // A sender that was held up does not begin what another one may take over before it ends.
    if (Date.now() + Math.min(attemptLastsAtMostMs, claimLastsMs / 2) > claimedUntil) return;
    let sent: SentText;
    try {
      sent = await handOver(message);
    } catch (error) {
      await settleAfter(error, message);
      return;
    }
    const isSettled = await settleSent(settling(), message, sent);
    if (!isSettled) log.warn({ messageId: message.id }, 'A sent message had been taken over');
  }

  async function handOver(message: ClaimedMessage): Promise<SentText> {
    if (message.channel === 'sms')
      return parts.sms.send({ to: message.address, body: message.body });
    const { calendar, calendarMethod } = message;
    const providerId = await parts.mail.send({
      id: message.id,
      to: message.address,
      subject: message.subject ?? '',
      body: message.body,
      calendar: calendar && calendarMethod ? { method: calendarMethod, content: calendar } : null,
    });
    return { providerId, segments: null };
  }

  async function settleAfter(error: unknown, message: ClaimedMessage): Promise<void> {
    const failure =
      error instanceof DeliveryFailure
        ? error
        : new DeliveryFailure('unknown', 'unexpected', 'The attempt ended unexpectedly.');
    log.warn(
      { messageId: message.id, code: failure.code, kind: failure.kind, attempts: message.attempts },
      'A message was not sent',
    );
    if (failure.kind === 'unknown')
      await keepInDoubt(settling(), message, { failure, askAt: Date.now() + claimLastsMs / 4 });
    else await settleFailed(settling(), message, failure);
  }

  async function tick(): Promise<number> {
    const taken = await take();
    // Looking for reports goes through everything that was sent lately: not between two texts of a busy evening. A text
    // that arrived after all is not claimed meanwhile.
    if (taken === 0 || Date.now() - reportsAppliedAt >= reportsEveryMs) {
      await applyDeliveryReports(db, clock.now(), giveUp);
      reportsAppliedAt = Date.now();
    }
    return taken;
  }

  async function take(): Promise<number> {
    const free = atOnce - inFlight.size;
    if (free <= 0) return 0;
    const isTime = Date.now() - abandonedSoughtAt >= abandonedEveryMs;
    const found = isTime ? await takeAbandoned(free) : 0;
    if (found === free) return found;
    const taken = found + (await takeDue(free - found));
    return taken > 0 || isTime ? taken : takeAbandoned(free);
  }

  async function takeDue(atMost: number): Promise<number> {
    const claim = { claimedBy, claimedUntil: Date.now() + claimLastsMs };
    const due = await claimMessages(db, { ...claim, now: clock.now(), atMost }, giveUp);
    for (const message of due.claimed) begin(send(message, claim.claimedUntil), message);
    return due.claimed.length + due.givenUp;
  }

  /** What a sender left in the middle waits long for its claim to end: it need not be sought between two texts. */
  async function takeAbandoned(atMost: number): Promise<number> {
    abandonedSoughtAt = Date.now();
    const realNow = Date.now();
    const claim = { claimedBy, claimedUntil: realNow + claimLastsMs };
    const abandoned = await claimAbandoned(db, { ...claim, realNow, atMost });
    for (const message of abandoned)
      begin(recover(settling(), message, parts.sms, realNow), message);
    return abandoned.length;
  }

  async function settled(): Promise<void> {
    await Promise.all(inFlight);
  }

  async function handFree(): Promise<void> {
    if (inFlight.size >= atOnce) await Promise.race(inFlight);
  }

  return {
    tick,
    settled,
    handFree,
    async drain() {
      for (;;) {
        const taken = await tick();
        if (taken === 0 && inFlight.size === 0) return;
        if (taken === 0) await Promise.race(inFlight);
      }
    },
  };
}
