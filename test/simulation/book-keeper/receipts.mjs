// What was received, with what it was meant as, and the checks that hold for every single message.
import { hour, minute } from './calendar.mjs';
import { answersToOwn, answerWithin, confirmationWithin, isQuiet } from './rules.mjs';
import { languageOf, unsafeIn } from './words.mjs';

/** The clock of the receiving side may be read a moment before that of the sending side. */
const readingSlack = 5_000;

/** The provider took these, and no phone ever showed them. */
const neverShown = new Set(['undelivered', 'failed']);

/** Joins texts and mails with the clinic's own record of them. The provider's own words are left out. */
export function receivedOf({ texts, mails, labels }) {
  const byProvider = new Map(labels.map((label) => [label.providerId, label]));
  const byId = new Map(labels.map((label) => [String(label.id), label]));
  return [
    ...texts
      .filter(({ direction, statusCallback }) => direction === 'out' && statusCallback !== null)
      .filter(({ status }) => !neverShown.has(status))
      .map((text) => ({
        channel: 'sms',
        address: text.phone,
        at: text.at,
        body: text.body,
        label: byProvider.get(text.id) ?? null,
      })),
    ...mails.map((mail) => ({
      channel: 'mail',
      address: mail.to,
      at: mail.at,
      body: [mail.subject, mail.body].join('\n'),
      attached: mail.attachments.map(({ content }) => content).join('\n'),
      messageId: mail.messageId,
      label: byId.get(/message-(\d+)@/.exec(mail.messageId)?.[1]) ?? null,
    })),
  ];
}

/** Checks that need no plan: opt-outs, quiet hours, languages, words, doubles. @param report (rule, message, says) */
export function checkEach({ received, texts, site, households, report }) {
  const wrote = new Map();
  for (const { direction, phone, at } of texts)
    if (direction === 'in') wrote.set(phone, [...(wrote.get(phone) ?? []), at]);
  const hasJustWritten = ({ address, at }, within) =>
    (wrote.get(address) ?? []).some((said) => said <= at + readingSlack && at - said <= within);
  const seen = new Map();
  let mailDoubles = 0;
  for (const message of received) {
    if (message.label?.staff) {
      // Whoever is on call: a text for other eyes says nothing about any child either.
      const unsafe = unsafeIn(
        message.body,
        households.all.flatMap(({ children }) => [...children.values()]),
      );
      if (unsafe) report('unsafe', message, `says ${unsafe}`);
      continue;
    }
    const owner = households.ofAddress(message.address);
    if (!owner) {
      report('stray', message, 'went to an address of nobody');
      continue;
    }
    const { household, adult } = owner;
    const children = [...household.children.values()];
    const unsafe = unsafeIn(`${message.body}\n${message.attached ?? ''}`, children);
    if (unsafe) report('unsafe', message, `says ${unsafe}`);
    const language = languageOf(message.body);
    if (!households.hasWords(adult)) report('unsigned', message, 'has no signed words');
    else if (language !== adult.language)
      report('unsigned', message, `is in "${language}" for a reader of "${adult.language}"`);
    if (message.channel === 'mail') {
      if (seen.has(message.messageId)) mailDoubles += 1;
      else seen.set(message.messageId, message);
      continue;
    }
    if (!message.label) report('doubled', message, 'is on no record of the clinic');
    const kind = message.label?.kind;
    const isAnswer = answersToOwn.has(kind) && hasJustWritten(message, answerWithin);
    if (
      !isAnswer &&
      isQuiet(message.at, site.zone, households.mayTextEarly(adult, message.at - readingSlack))
    )
      report('quiet', message, 'came in the quiet hours');
    const offSince = households.offSince(message.address, message.at - readingSlack);
    const isStillOff = households.offSince(message.address, message.at + readingSlack) !== null;
    const isConfirmation =
      kind === 'opt-out-confirmation' && message.at - (offSince ?? 0) <= confirmationWithin;
    if (!isAnswer && !households.hasConsented(adult, message.at - readingSlack))
      report('opted-out', message, 'came without consent');
    if (offSince !== null && isStillOff && !isConfirmation)
      report('opted-out', message, 'came after the number had opted out');
  }
  return { mailDoubles };
}

/** More than one of a kind for one household and moment, unless something changed in between. */
export function checkDoubles({ received, households, report }) {
  const groups = new Map();
  const mails = new Set();
  for (const message of received) {
    const { label, channel, address, messageId } = message;
    // The same mail again after an unknown end is counted apart.
    if (!label || (channel === 'mail' && mails.has(messageId))) continue;
    if (channel === 'mail') mails.add(messageId);
    if (!['ahead', 'evening', 'morning', 'nudge', 'reminder'].includes(label.kind)) continue;
    // Two babies of one family can have a last feed each: their reminders differ.
    const moment = label.kind === 'reminder' ? Math.round(message.at / (20 * minute)) : 0;
    const key = [label.kind, label.household, label.morningOn, address, moment, channel].join('|');
    groups.set(key, [...(groups.get(key) ?? []), message]);
  }
  for (const those of groups.values()) {
    those.sort((one, other) => one.at - other.at);
    those.slice(1).forEach((message, index) => {
      const before = those[index];
      const { household } = households.ofAddress(message.address) ?? {};
      const hasChanged = household?.changes.some((at) => at >= before.at && at <= message.at);
      if (!hasChanged) report('doubled', message, 'came twice for one moment');
    });
  }
}

export const within = (message, from, until) =>
  message.at >= from - readingSlack && message.at <= until + minute;

export const aDay = 24 * hour;
