import type { Twilio, default as TwilioModule } from 'twilio';
import type RequestClient from 'twilio/lib/base/RequestClient';
import type { Settings } from '../../config/settings';
import { DeliveryFailure } from '../delivery-failure';
import { failureOfSms } from './sms-failure';

export interface SentText {
  readonly providerId: string;
  /** Parts, as the provider counts; null where it did not say. */
  readonly segments: number | null;
}

export interface SmsChannel {
  /** @throws DeliveryFailure */
  send(text: { readonly to: string; readonly body: string }): Promise<SentText>;
  /**
   * What the provider took for this number with these words since an instant (epoch milliseconds), newest first;
   * texts that it reports as failed are left out.
   * @throws DeliveryFailure
   */
  find(text: {
    readonly to: string;
    readonly body: string;
    readonly since: number;
  }): Promise<SentText[]>;
}

const telephone = /^\+[1-9]\d{6,14}$/;
const looksAtTexts = 50;

/** The provider's SDK takes 20 MB and a quarter of a second to load: the sender loads it at its first text. */
async function openClient({ sms, sender }: Pick<Settings, 'sms' | 'sender'>): Promise<Twilio> {
  const { default: twilio } = (await import('twilio')) as unknown as {
    default: typeof TwilioModule;
  };
  if (sms.provider === 'twilio')
    return twilio(sms.accountSid, sms.authToken, {
      httpClient: new twilio.RequestClient({ timeout: sender.answersWithinMs }),
    });
  class StandInClient extends twilio.RequestClient {
    override request<Data>(options: RequestClient.RequestOptions<Data>) {
      const uri = options.uri.replace(/^https:\/\/[a-z0-9.-]+\.twilio\.com/, sms.standInUrl);
      return super.request<Data>({ ...options, uri });
    }
  }
  return twilio(sms.accountSid, sms.authToken, {
    httpClient: new StandInClient({ timeout: sender.answersWithinMs }),
  });
}

export function openSmsChannel(settings: Settings): SmsChannel {
  const { sms, origin } = settings;
  let opening: Promise<Twilio> | undefined;
  const client = () => (opening ??= openClient(settings));
  return {
    async send({ to, body }) {
      if (!telephone.test(to))
        throw new DeliveryFailure('refused', 'bad-number', 'This is no telephone number.');
      if (body.trim() === '')
        throw new DeliveryFailure('refused', 'empty', 'A text without words is never sent.');
      try {
        const answer = await (
          await client()
        ).messages.create({
          to,
          from: sms.from,
          body,
          statusCallback: `${origin}/hooks/sms/status`,
        });
        return { providerId: answer.sid, segments: partsOf(answer.numSegments) };
      } catch (error) {
        throw failureOfSms(error);
      }
    },
    async find({ to, body, since }) {
      try {
        // No filter by date: a text that was just taken has no date of sending yet.
        const texts = await (await client()).messages.list({ to, limit: looksAtTexts });
        return texts
          .filter(
            (text) =>
              text.direction.startsWith('outbound') &&
              text.body.trim() === body.trim() &&
              // The provider keeps whole seconds.
              text.dateCreated.getTime() >= Math.floor(since / 1000) * 1000 &&
              !['failed', 'undelivered', 'canceled'].includes(text.status),
          )
          .map((text) => ({ providerId: text.sid, segments: partsOf(text.numSegments) }));
      } catch (error) {
        throw failureOfSms(error);
      }
    },
  };
}

function partsOf(text: string | undefined): number | null {
  const parts = Number(text);
  return Number.isInteger(parts) && parts > 0 ? parts : null;
}
