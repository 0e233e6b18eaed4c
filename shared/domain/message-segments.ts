/**
 * How many parts a text message takes. The alphabet is 3GPP TS 23.038: 160 septets in one part,
 * 153 in each part of several; any other character turns the whole text into UCS-2 with 70 and 67
 * units. An escape pair and a surrogate pair are never split over two parts.
 */

const basicAlphabet =
  '@£$¥èéùìòÇ\nØø\rÅåΔ_ΦΓΛΩΠΨΣΘΞÆæßÉ !"#¤%&\'()*+,-./0123456789:;<=>?' +
  '¡ABCDEFGHIJKLMNOPQRSTUVWXYZÄÖÑÜ§¿abcdefghijklmnopqrstuvwxyzäöñüà';
/** Reached by an escape: two septets each. */
const extendedAlphabet = '\f^{}\\[~]|€';

const septetsOf = new Map<string, number>([
  ...[...basicAlphabet].map((character): [string, number] => [character, 1]),
  ...[...extendedAlphabet].map((character): [string, number] => [character, 2]),
]);

export class EmptyMessage extends RangeError {
  constructor() {
    super('A message without text is never sent.');
    this.name = 'EmptyMessage';
  }
}

export interface MessageSegments {
  readonly encoding: 'gsm-7' | 'ucs-2';
  /** Septets or UCS-2 units. */
  readonly units: number;
  readonly segments: number;
  /** Characters, each once, that force UCS-2. */
  readonly notGsm: readonly string[];
}

export function messageSegments(text: string): MessageSegments {
  if (text === '') throw new EmptyMessage();
  const characters = [...text];
  const notGsm = [...new Set(characters.filter((character) => !septetsOf.has(character)))];
  const isGsm = notGsm.length === 0;
  const sizes = characters.map((character) =>
    isGsm ? (septetsOf.get(character) ?? 1) : character.length,
  );
  const units = sizes.reduce((sum, size) => sum + size, 0);
  const [single, part] = isGsm ? [160, 153] : [70, 67];
  const segments = units <= single ? 1 : partsNeeded(sizes, part);
  return { encoding: isGsm ? 'gsm-7' : 'ucs-2', units, segments, notGsm };
}

function partsNeeded(sizes: readonly number[], part: number): number {
  let parts = 1;
  let used = 0;
  for (const size of sizes) {
    if (used + size > part) {
      parts += 1;
      used = 0;
    }
    used += size;
  }
  return parts;
}

/** What stands for a letter or mark that the short alphabet lacks, as people write it in texts. */
const plainer: Readonly<Record<string, string>> = {
  ...{ á: 'a', í: 'i', ó: 'o', ú: 'u', Á: 'A', Í: 'I', Ó: 'O', Ú: 'U', ç: 'Ç', ã: 'a', õ: 'o' },
  ...{ '‘': "'", '’': "'", '“': '"', '”': '"', '–': '-', '—': '-', '…': '...' },
  ...{ '\u00a0': ' ', '\u202f': ' ', '\t': ' ' },
};

/**
 * The text in the short alphabet where that costs nothing but an accent ("sabado") or a curly quote;
 * one such letter would halve what a part holds. A text in another script stays as it is.
 */
export function inShortAlphabet(text: string): string {
  const plain = [...text].map((character) => plainer[character] ?? character);
  return plain.every((part) => [...part].every((character) => septetsOf.has(character)))
    ? plain.join('')
    : text;
}
