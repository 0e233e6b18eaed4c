import { createTransport } from 'nodemailer';
import type { Settings } from '../../config/settings';
import { DeliveryFailure } from '../delivery-failure';
import { failureOfMail } from './mail-failure';

export interface MailToSend {
  /** The message's row: makes the Message-ID, so that a repeat after an unknown end is the same mail. */
  readonly id: number;
  readonly to: string;
  readonly subject: string;
  readonly body: string;
  readonly calendar: {
    readonly method: 'REQUEST' | 'CANCEL' | 'PUBLISH';
    readonly content: string;
  } | null;
}

export interface MailChannel {
  /** @returns the Message-ID. @throws DeliveryFailure */
  send(mail: MailToSend): Promise<string>;
  close(): void;
}

/** Line breaks in an address would smuggle in recipients; quoted local parts are not worth their risks. */
const address = /^[A-Za-z0-9.!#$%&'*+/=?^_`{|}~-]{1,64}@[A-Za-z0-9-]{1,63}(\.[A-Za-z0-9-]{1,63})+$/;

export const isMailAddress = (text: string): boolean => text.length <= 254 && address.test(text);

export const messageIdOf = (id: number, from: string): string =>
  `<message-${id}@${from.slice(from.lastIndexOf('@') + 1)}>`;

export function openMailChannel({ mail, sender }: Pick<Settings, 'mail' | 'sender'>): MailChannel {
  const transport = createTransport({
    url: mail.url,
    pool: true,
    maxConnections: 3,
    connectionTimeout: 10_000,
    greetingTimeout: 10_000,
    socketTimeout: sender.answersWithinMs,
    disableFileAccess: true,
    disableUrlAccess: true,
  });
  return {
    async send({ id, to, subject, body, calendar }) {
      if (!isMailAddress(to))
        throw new DeliveryFailure('refused', 'bad-address', 'This is no e-mail address.');
      const messageId = messageIdOf(id, mail.from);
      try {
        await transport.sendMail({
          from: { name: '', address: mail.from },
          to: { name: '', address: to },
          subject,
          text: body,
          messageId,
          headers: { 'Auto-Submitted': 'auto-generated' },
          ...(calendar && {
            icalEvent: {
              method: calendar.method,
              content: calendar.content,
              filename: 'visit.ics',
            },
          }),
        });
        return messageId;
      } catch (error) {
        throw failureOfMail(error);
      }
    },
    close: () => transport.close(),
  };
}
