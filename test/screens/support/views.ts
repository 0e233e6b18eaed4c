import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { isLanguageId } from '../../../shared/languages/languages';

export interface View {
  readonly width: number;
  readonly height: number;
  readonly language: string;
  readonly scheme: 'light' | 'dark';
}

const sizes = [
  [320, 568],
  [390, 844],
  [768, 1024],
  [1280, 800],
  [1920, 1080],
] as const;

export const widths: readonly number[] = sizes.map(([width]) => width);
export const schemes = ['light', 'dark'] as const;

const dist = join(__dirname, '..', '..', '..', 'dist');

/** The languages in which an application was built. */
export function languagesOf(application: 'family' | 'clinic'): readonly string[] {
  return readdirSync(join(dist, application))
    .filter((name) => isLanguageId(name))
    .sort((left, right) => Number(right === 'en') - Number(left === 'en'));
}

/**
 * The views of the screen with this number: every width once, each language and both schemes among them. Over as many
 * screens as there are languages times two, every pair of width, language and scheme occurs.
 */
export function viewsOf(number: number, languages: readonly string[]): readonly View[] {
  const turn = Math.floor(number / languages.length);
  return sizes.map(([width, height], index) => ({
    width,
    height,
    language: languages[(index + number) % languages.length] ?? 'en',
    scheme: schemes[(index + turn) % 2] ?? 'light',
  }));
}

/** A window of 1280 x 1024 at 400 %: what is left is 320 x 256. */
export const zoomed = (views: readonly View[]): readonly View[] =>
  views.filter(({ width }) => width === 320).map((view) => ({ ...view, height: 256 }));

/** Telephones, whose layout stays when a reader makes the text larger; at a desk the layout follows the text. */
export const inHand = (views: readonly View[]): readonly View[] =>
  views.filter(({ width }) => width < 700);

/** The telephone and the desk. */
export const handAndDesk = (views: readonly View[]): readonly View[] =>
  views.filter(({ width }) => width === 390 || width === 1280);

/**
 * What a sheet of letter paper has between its margins, at 96 pixels to the inch; each language once. Families get it
 * upright, the clinic across.
 */
export const onPaper = (languages: readonly string[], isAcross: boolean): readonly View[] =>
  languages.map((language) => ({
    width: isAcross ? 973 : 710,
    height: isAcross ? 733 : 950,
    language,
    scheme: 'dark',
  }));
