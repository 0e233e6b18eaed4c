import { readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';

interface Face {
  readonly family: string;
  readonly package: string;
  readonly subsets: readonly string[];
  readonly weights: readonly number[];
}

/** Names of families come in every Latin alphabet; Arabic script has one face and one weight, ranked by size. */
const nunito: Face = {
  family: 'Nunito',
  package: '@fontsource/nunito',
  subsets: ['latin', 'latin-ext', 'vietnamese'],
  weights: [400, 700],
};
const vazirmatn: Face = {
  family: 'Vazirmatn',
  package: '@fontsource/vazirmatn',
  subsets: ['arabic'],
  weights: [400],
};

const inArabicScript = new Set(['ar', 'fa-AF']);

function rules(face: Face): string {
  const folder = dirname(require.resolve(`${face.package}/package.json`));
  const ranges = JSON.parse(readFileSync(join(folder, 'unicode.json'), 'utf8')) as Record<
    string,
    string
  >;
  const slug = face.package.split('/')[1] ?? '';
  return face.subsets
    .flatMap((subset) =>
      face.weights.map((weight) => {
        const file = join(folder, 'files', `${slug}-${subset}-${weight}-normal.woff2`);
        const data = readFileSync(file).toString('base64');
        return `@font-face{font-family:${face.family};font-weight:${weight};src:url(data:font/woff2;base64,${data}) format('woff2');unicode-range:${ranges[subset] ?? 'U+0-10FFFF'}}`;
      }),
    )
    .join('');
}

const made = new Map<Face, string>();

/** The font rules of a page in this language, with the fonts inside: a printed page has no network. */
export function fontRules(language: string): string {
  const faces = inArabicScript.has(language) ? [nunito, vazirmatn] : [nunito];
  return faces
    .map((face) => {
      const known = made.get(face) ?? rules(face);
      made.set(face, known);
      return known;
    })
    .join('');
}
