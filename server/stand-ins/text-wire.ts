import type { PretendText } from './store';

export interface TextAccount {
  readonly sid: string;
  readonly token: string;
  /** The clinic's number. */
  readonly from: string;
}

/** RFC 2822 with a numeric zone, in whole seconds, as the service writes dates. */
const wireDate = (at: number): string => new Date(at).toUTCString().replace('GMT', '+0000');

export const textError = (status: number, code: number, message: string) => ({
  code,
  message,
  more_info: `https://www.twilio.com/docs/errors/${code}`,
  status,
});

/** A text as the service shows it. */
export function asMessage(account: TextAccount, text: PretendText) {
  const isOut = text.direction === 'out';
  const uri = `/2010-04-01/Accounts/${account.sid}/Messages/${text.id}`;
  const hasLeft = !['queued', 'accepted'].includes(text.status);
  return {
    account_sid: account.sid,
    api_version: '2010-04-01',
    body: text.body,
    date_created: wireDate(text.at),
    date_sent: hasLeft ? wireDate(text.at) : null,
    date_updated: wireDate(text.at),
    direction: isOut ? 'outbound-api' : 'inbound',
    error_code: text.errorCode,
    error_message: null,
    from: isOut ? account.from : text.phone,
    messaging_service_sid: null,
    num_media: '0',
    num_segments: String(text.segments),
    price: null,
    price_unit: 'USD',
    sid: text.id,
    status: text.status,
    subresource_uris: { media: `${uri}/Media.json` },
    to: isOut ? text.phone : account.from,
    uri: `${uri}.json`,
  };
}

/** A page of texts, newest first, by the service's filters. */
export function asPage(
  account: TextAccount,
  texts: readonly PretendText[],
  query: Readonly<Record<string, string | undefined>>,
) {
  const size = Math.min(Math.max(Number(query['PageSize']) || 50, 1), 1000);
  const messages = texts
    .map((text) => asMessage(account, text))
    .filter(
      (message) =>
        (query['To'] === undefined || message.to === query['To']) &&
        (query['From'] === undefined || message.from === query['From']) &&
        sentWithin(message.date_sent, query),
    )
    .reverse()
    .slice(0, size);
  const uri = `/2010-04-01/Accounts/${account.sid}/Messages.json`;
  return {
    messages,
    first_page_uri: `${uri}?PageSize=${size}&Page=0`,
    next_page_uri: null,
    previous_page_uri: null,
    page: 0,
    page_size: size,
    start: 0,
    end: Math.max(0, messages.length - 1),
    uri: `${uri}?PageSize=${size}&Page=0`,
  };
}

/** 'DateSent' is a day, 'DateSent>' and 'DateSent<' are open ends; a text that has not left has no date. */
function sentWithin(
  sent: string | null,
  query: Readonly<Record<string, string | undefined>>,
): boolean {
  const { DateSent: on, 'DateSent>': from, 'DateSent<': until } = query;
  if (on === undefined && from === undefined && until === undefined) return true;
  if (sent === null) return false;
  const at = Date.parse(sent);
  return (
    (on === undefined || new Date(at).toISOString().startsWith(on.slice(0, 10))) &&
    (from === undefined || at >= Date.parse(from)) &&
    (until === undefined || at <= Date.parse(until))
  );
}
