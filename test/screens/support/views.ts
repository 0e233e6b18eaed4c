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
