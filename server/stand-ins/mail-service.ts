import { randomBytes } from 'node:crypto';
import { simpleParser, type ParsedMail } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import type { Fault, Faults } from './faults';
import type { PretendMail, StandInStore } from './store';

export interface MailServiceParts {
  readonly store: StandInStore;
  readonly faults: Faults;
  readonly now: () => Promise<number>;
}

class Refused extends Error {
  constructor(readonly responseCode: number) {
    super('Refused as told');
  }
}

/** A mail server that takes everything and delivers into pretended mailboxes. */
export function mailService({ store, faults, now }: MailServiceParts): SMTPServer {
  const faultOf = new Map<string, Fault | undefined>();
  return new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    closeTimeout: 100,
    onRcptTo(recipient, session, done) {
      const fault = faults.next('mail', recipient.address);
      faultOf.set(session.id, fault);
      if (fault?.does === 'refuse') done(new Refused(fault.code ?? 550));
      else done();
    },
    onData(stream, session, done) {
      const fault = faultOf.get(session.id);
      faultOf.delete(session.id);
      const take = async (): Promise<void> => {
        const parsed = await simpleParser(stream);
        if (fault?.does === 'hold') return;
        if (fault?.does === 'delay') await new Promise((resolve) => setTimeout(resolve, fault.ms));
        const recipients = session.envelope.rcptTo.map(({ address }) => address);
        for (const to of recipients) store.addMail(mailOf(parsed, to, await now()));
        if (fault?.does !== 'accept-then-hold') done();
      };
      take().catch(() => done(new Refused(451)));
    },
  });
}

function mailOf(parsed: ParsedMail, to: string, at: number): PretendMail {
  return {
    id: randomBytes(8).toString('hex'),
    messageId: parsed.messageId ?? '',
    from: parsed.from?.value[0]?.address ?? '',
    to,
    subject: parsed.subject ?? '',
    body: parsed.text ?? '',
    at,
    isAutomatic: parsed.headers.get('auto-submitted') === 'auto-generated',
    attachments: parsed.attachments.map((one) => ({
      name: one.filename ?? 'attachment',
      type: one.contentType,
      content: one.content.toString('utf8'),
    })),
  };
}
