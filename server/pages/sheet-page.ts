import { languageOf } from '../../shared/languages/languages';
import type { LanguageId } from '../../shared/languages/languages';
import type { Context } from '../context';
import { escapeHtml } from '../printing/page';
import { canSpeak, loadWording } from '../wording/render';
import type { Wording } from '../wording/render';
import { smallPage } from './small-page';

/** In the order in which a family needs them; a text that a language lacks is left out with its point. */
const points = [
  'sheet.nothing',
  'sheet.infants',
  'sheet.medicine',
  'sheet.pacifier',
  'sheet.adults',
  'sheet.mistake',
  'sheet.ill',
  'sheet.bring',
] as const;
/** Without these the sheet would be unsafe and is not shown at all. */
const musts = ['sheet.title', 'sheet.intro', 'sheet.nothing', 'sheet.danger'] as const;

/**
 * The public fasting sheet: no script, no hours of any clinic, nothing about anybody.
 * @returns null when this language has no sheet.
 */
export async function sheetPage(context: Context, language: LanguageId): Promise<string | null> {
  if (!canSpeak(language)) return null;
  const wording = await loadWording(context.db, language);
  if (!musts.every((key) => wording.has(key))) return null;
  const { tag, dir } = languageOf(language);
  const say = (key: string): string => escapeHtml(wording.text(key));
  const shown = points.filter((key) => wording.has(key));
  const notice = draftNotice(wording, [...musts, ...shown]);
  return smallPage({
    language: tag,
    dir,
    title: wording.text('sheet.title'),
    body: [
      ...(notice === null ? [] : [`<p class="soft">${escapeHtml(notice)}</p>`]),
      `<h1>${say('sheet.title')}</h1>`,
      `<p>${say('sheet.intro')}</p>`,
      `<ul>${shown.map((key) => `<li>${say(key)}</li>`).join('')}</ul>`,
      `<p class="urgent">${say('sheet.danger')}</p>`,
    ].join('\n'),
  });
}

function draftNotice(wording: Wording, keys: readonly string[]): string | null {
  if (wording.isSignedOff(keys) || !wording.has('draft-notice')) return null;
  return wording.draftNotice(keys);
}
