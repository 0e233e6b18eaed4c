/**
 * A reply by text message. Digits work in every script; whatever is not plainly one of the known
 * replies goes to a person.
 */

export type Reply =
  | {
      readonly kind: 'digit';
      readonly digit: 1 | 2 | 3;
      /** What was written beside a 2, for a person to read. */
      readonly words?: string;
    }
  /** Which child, where that was asked: 4 is the first of the list. */
  | { readonly kind: 'choice'; readonly choice: number }
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
  ...['baja', 'cancelar', 'إيقاف', 'ايقاف', 'إلغاء', 'الغاء', 'arrêt', 'arret'],
  // Plain sentences that leave no doubt ("any other reasonable way", the same rule).
  ...['stop please', 'please stop', 'stop texting me', 'stop texting', 'stop texts', 'stop all'],
  ...['no more texts', 'do not text me', "don't text me", 'no más mensajes', 'no mas mensajes'],
]);
const optInWords = new Set(['start', 'unstop', 'yes']);
const helpWords = new Set(['help', 'info', 'ayuda', 'مساعدة']);

/** Words beside a digit that change nothing about it. */
const politeWords = new Set([
  ...[
    'ok',
    'okay',
    'thanks',
    'thank',
    'you',
    'please',
    'hello',
    'good',
    'morning',
    'the',
    'answer',
  ],
  ...['is', 'gracias', 'por', 'favor', 'hola', 'buenos', 'buenas', 'días', 'dias', 'شكرا', 'شكرًا'],
]);
/** And those that say the same as the digit. */
const sameAs: Readonly<Record<number, ReadonlySet<string>>> = {
  1: new Set(['nothing', 'nada', 'شيء', 'لا']),
  3: new Set(['not', 'coming', 'no', 'vamos', 'a', 'ir', 'لن', 'نأتي']),
};

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
const unpositionalDigits = ['፩፪፫፬፭፮፯፰፱', '一二三四五六七八九'];

export function parseReply(text: string): Reply {
  const plain = plainOf(text);
  const numbered = numberedOf(plain);
  if (numbered) return numbered;
  const word = plain.replace(/^opt[\s-]+out$/, 'optout').replace(/\s+/g, ' ');
  if (optOutWords.has(word)) return { kind: 'opt-out' };
  if (optInWords.has(word)) return { kind: 'opt-in' };
  if (helpWords.has(word)) return { kind: 'help' };
  return { kind: 'unclear' };
}

/**
 * A digit, alone or with words beside it. "1" with a "but" in it is read by a person; beside a 2, the careful answer, the
 * words go to a person and the digit counts. A digit in a time ("3:30", "3 am") is none.
 */
function numberedOf(plain: string): Reply | null {
  const words = plain
    .replace(/\p{Extended_Pictographic}/gu, ' ')
    .split(/[\s,;!=().-]+/)
    .map((word) => word.replace(closingMarks, ''))
    .filter((word) => word !== '');
  const digits = words.map(digitOf);
  const [first] = digits.filter((digit) => digit !== null);
  if (first === undefined || first === null) return null;
  // Twice the same, as for two children, is the same; two different ones are for a person.
  if (digits.some((digit) => digit !== null && digit !== first)) return null;
  const beside = words.filter(
    (word, place) => digits[place] === null && !politeWords.has(word) && !sameAs[first]?.has(word),
  );
  if (first > 3) return beside.length === 0 ? { kind: 'choice', choice: first } : null;
  const digit = first as 1 | 2 | 3;
  if (beside.length === 0) return { kind: 'digit', digit };
  const isSecond = digit === 2 && digits[0] === 2 && !beside.some((word) => /\d/.test(word));
  return isSecond ? { kind: 'digit', digit, words: beside.join(' ') } : null;
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

/** 1 to 9 in any of the scripts; null for anything else. */
function digitOf(word: string): number | null {
  if ([...word].length !== 1) return null;
  const code = word.codePointAt(0) ?? 0;
  const byZero = zeros.map((zero) => code - zero).find((value) => value >= 1 && value <= 9);
  const byPlace = unpositionalDigits
    .map((digits) => digits.indexOf(word) + 1)
    .find((value) => value >= 1);
  return byZero ?? byPlace ?? null;
}
