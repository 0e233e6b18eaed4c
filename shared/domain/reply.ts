/**
 * A reply by text message. Digits work in every script; whatever is not plainly one of the known
 * replies goes to a person.
 */

export type Reply =
  | { readonly kind: 'digit'; readonly digit: 1 | 2 | 3 }
  | { readonly kind: 'opt-out' }
  | { readonly kind: 'help' }
  | { readonly kind: 'opt-in' }
  | { readonly kind: 'unclear' };

/**
 * 47 CFR 64.1200(a)(10): stop, quit, end, revoke, opt out, cancel, unsubscribe. The second row is
 * what message providers take as well; the third has the words of other languages, each to be
 * confirmed by a qualified translator.
 */
const optOutWords = new Set([
  ...['stop', 'quit', 'end', 'revoke', 'optout', 'cancel', 'unsubscribe'],
  ...['stopall'],
  ...['alto', 'parar', 'توقف', 'ይቁም', 'dừng', '停止', 'tigil', 'sispann', 'jooji'],
]);
const optInWords = new Set(['start', 'unstop', 'yes']);
const helpWords = new Set(['help', 'info']);

/** Digit zero of the scripts our families may write in. */
const zeros = [
  0x30, // Latin
  0x660, // Arabic
  0x6f0, // Persian, Dari
  0x966, // Devanagari
  0x1040, // Myanmar
  0xff10, // full width
];
/** Scripts without a zero: Ethiopic and Han. */
const unpositionalDigits = ['፩፪፫', '一二三'];

export function parseReply(text: string): Reply {
  const plain = plainOf(text);
  const digit = digitOf(plain);
  if (digit) return { kind: 'digit', digit };
  const word = plain.replace(/^opt[\s-]+out$/, 'optout');
  if (optOutWords.has(word)) return { kind: 'opt-out' };
  if (optInWords.has(word)) return { kind: 'opt-in' };
  if (helpWords.has(word)) return { kind: 'help' };
  return { kind: 'unclear' };
}

/** Spaces, quotes, brackets and the full stops of Arabic, Devanagari, Myanmar, Ethiopic and Han. */
const closingMarks =
  /[\s"'“”‘’«»)\].,!\u060c\u06d4\u0964\u104a\u104b\u1361\u1362\u3002\uff0e\uff01]+$/;

/** Lower case, without the marks that telephones add around a word: dots, quotes, direction. */
function plainOf(text: string): string {
  return text
    .normalize('NFC')
    .toLowerCase()
    .replace(/[\u200b-\u200f\u202a-\u202e\u2066-\u2069\ufeff]|\ufe0f|\u20e3/g, '')
    .replace(/^[\s"'“”‘’«»([]+/, '')
    .replace(closingMarks, '');
}

function digitOf(plain: string): 1 | 2 | 3 | null {
  if ([...plain].length !== 1) return null;
  const code = plain.codePointAt(0) ?? 0;
  const byZero = zeros.map((zero) => code - zero).find((value) => value >= 1 && value <= 3);
  const byPlace = unpositionalDigits
    .map((digits) => digits.indexOf(plain) + 1)
    .find((value) => value >= 1);
  return ((byZero ?? byPlace) as 1 | 2 | 3 | undefined) ?? null;
}
