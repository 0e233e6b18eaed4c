import type { AlertKind } from '../../shared/contracts/alerts';
import { languageOf } from '../../shared/languages/languages';
import { isClinicLanguage } from '../../shared/languages/clinic-languages';
import { renderText } from '../wording/render';
import { shippedWords } from '../wording/shipped-words';

export interface AlertToTell {
  readonly kind: AlertKind;
  /** What texts call the site. */
  readonly siteShortName: string;
  readonly count: number;
  readonly waitMinutes: number;
}

export interface AlertWords {
  readonly text: string;
  readonly subject: string;
  readonly mail: string;
}

/**
 * What a member of the staff reads on a telephone that others may look at: the site, what is the matter, where to look.
 * Never a child, a disease or a result. Words for staff are not signed off: no family reads them.
 */
export function alertWords(
  origin: string,
  language: string,
  { kind, siteShortName, count, waitMinutes }: AlertToTell,
): AlertWords {
  const own = isClinicLanguage(language) ? language : 'en';
  const words = shippedWords(own);
  const { intlTag } = languageOf(own);
  const params = {
    clinic: siteShortName,
    count,
    minutes: waitMinutes,
    url: `${origin}/clinic/${own}/alerts`,
  };
  const say = (key: string, more: Readonly<Record<string, string>> = {}): string =>
    renderText(key, words[key] ?? '', intlTag, { ...params, ...more });
  const says = say(`staff.alert.${kind}`);
  return {
    text: say('staff.alert.text', { says }),
    subject: say('staff.alert.subject'),
    mail: say('staff.alert.mail', { says }),
  };
}
