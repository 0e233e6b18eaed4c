/**
 * The one list of languages. A language is built when its screens, wording seed and profile exist;
 * the others keep their place in addresses and records, so that a family's choice is never lost.
 */

export interface Language {
  readonly id: LanguageId;
  /** For html lang and dir. */
  readonly tag: string;
  readonly dir: 'ltr' | 'rtl';
  readonly nativeName: string;
  readonly englishName: string;
  /** For Intl: Gregorian calendar and Latin digits, whatever the language's own default. */
  readonly intlTag: string;
  readonly isBuilt: boolean;
}

export const languageIds = [
  'en',
  'es',
  'ar',
  'am',
  'my',
  'zh-Hans',
  'vi',
  'fil',
  'ht',
  'ne',
  'so',
  'fa-AF',
] as const;
export type LanguageId = (typeof languageIds)[number];

function language(
  id: LanguageId,
  tag: string,
  nativeName: string,
  englishName: string,
  more: Partial<Pick<Language, 'dir' | 'isBuilt'>> = {},
): Language {
  // Intl has no Haitian Creole and would fall back to the system's language; French words are as
  // wrong, so that its profile writes every date by hand and Intl only formats numbers.
  const base = id === 'ht' ? 'fr-HT' : tag;
  const intlTag = `${base}-u-ca-gregory-nu-latn`;
  return { id, tag, nativeName, englishName, intlTag, dir: 'ltr', isBuilt: false, ...more };
}

/** In the order in which they are offered. */
export const languages: readonly Language[] = [
  language('en', 'en-US', 'English', 'English', { isBuilt: true }),
  language('es', 'es-US', 'Español', 'Spanish', { isBuilt: true }),
  language('ar', 'ar', 'العربية', 'Arabic', { dir: 'rtl', isBuilt: true }),
  language('am', 'am', 'አማርኛ', 'Amharic'),
  language('my', 'my', 'မြန်မာ', 'Burmese'),
  language('zh-Hans', 'zh-Hans', '简体中文', 'Chinese, simplified'),
  language('vi', 'vi', 'Tiếng Việt', 'Vietnamese'),
  language('fil', 'fil', 'Filipino', 'Filipino'),
  language('ht', 'ht', 'Kreyòl ayisyen', 'Haitian Creole'),
  language('ne', 'ne', 'नेपाली', 'Nepali'),
  language('so', 'so', 'Soomaali', 'Somali'),
  language('fa-AF', 'fa-AF', 'دری', 'Dari', { dir: 'rtl' }),
];

export const builtLanguages: readonly Language[] = languages.filter(({ isBuilt }) => isBuilt);

export function isLanguageId(text: string): text is LanguageId {
  return (languageIds as readonly string[]).includes(text);
}

export function languageOf(id: LanguageId): Language {
  const found = languages.find((candidate) => candidate.id === id);
  if (!found) throw new RangeError(`Not a language: ${id}`);
  return found;
}
