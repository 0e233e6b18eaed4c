import type { SiteForm } from '../../shared/contracts/set-up';
import { isLanguageId } from '../../shared/languages/languages';
import { validateZone } from '../../shared/domain/zone';
import { internationalPhone } from '../children/contact-details';
import type { FieldError } from '../http/problem';
import { countriesOf, regionsOf } from './public-holidays';
import { emergencyNumberOf } from './rule-packs';

/** A form whose telephone is E.164 and whose emergency number is there. */
export interface CheckedSite extends SiteForm {
  readonly emergencyNumber: string;
}

/** Texts go out between these times; see `shared/domain/quiet-hours`. */
const textsFrom = '08:00';
const textsUntil = '21:00';
/** The morning question must leave time to get up and answer. */
const leastQuestionMinutes = 30;
/** Texts and calendar entries show these to whoever looks at the telephone. */
const telling =
  /tubercul|\btb\b|\btbc\b|gastric|gástric|aspirat|sputum|esputo|culture|cultivo|\bhiv\b|\bvih\b/i;

/** What the shapes of the fields alone do not show. */
export function checkedSite(form: SiteForm): {
  readonly site: CheckedSite;
  readonly errors: readonly FieldError[];
} {
  const errors: FieldError[] = [];
  const refuse = (path: string, message: string): void => {
    errors.push({ path, message });
  };
  const isKnownCountry = form.country in countriesOf();
  if (!isKnownCountry) refuse('country', 'Choose a country of the list.');
  else if (form.region !== null && !(form.region in regionsOf(form.country)))
    refuse('region', 'Choose a region of the list.');
  if (!isZone(form.zone)) refuse('zone', 'There is no such time zone.');
  const phone = internationalPhone(form.phone, form.country);
  if (phone === null) refuse('phone', 'This number is too short, too long or lacks its area code.');
  const emergencyNumber = form.emergencyNumber ?? emergencyNumberOf(form.country);
  if (emergencyNumber === null)
    refuse('emergencyNumber', 'No number is known for this country. Enter it.');
  else if (!/^\+?\d[\d -]{1,18}$/.test(emergencyNumber))
    refuse('emergencyNumber', 'A telephone number has digits only.');
  if (!form.dawnLanguages.every(isLanguageId))
    refuse('dawnLanguages', 'Choose languages of the list.');
  for (const field of ['shortName', 'address', 'door', 'doorDirections'] as const)
    if (telling.test(form[field]))
      refuse(field, 'Others may read this on a telephone: it names neither a disease nor a test.');
  refuseTimes(form, refuse);
  return {
    site: { ...form, phone: phone ?? form.phone, emergencyNumber: emergencyNumber ?? '' },
    errors,
  };
}

function refuseTimes(form: SiteForm, refuse: (path: string, message: string) => void): void {
  if (form.dawnPhone.from >= form.dawnPhone.until)
    refuse('dawnPhone.until', 'This ends before it begins.');
  if (form.arrivals.from > form.arrivals.until)
    refuse('arrivals.until', 'This ends before it begins.');
  if (form.minutesPerChild < 5) refuse('minutesPerChild', 'At least 5 minutes.');
  for (const field of ['aheadTextTime', 'eveningTextTime'] as const)
    if (form[field] < textsFrom || form[field] >= textsUntil)
      refuse(field, 'Texts rest from 21:00 to 8:00. Choose a time between.');
  if (form.eveningTextTime < '12:00')
    refuse('eveningTextTime', 'The evening text goes out after noon.');
  const question = form.morningQuestionMinutesBefore;
  if (question < leastQuestionMinutes)
    refuse('morningQuestionMinutesBefore', 'At least 30 minutes: the family gets up and answers.');
  if (form.nudgeMinutesBefore >= question && form.nudgeMinutesBefore > 0)
    refuse(
      'nudgeMinutesBefore',
      'The second question comes after the first: fewer minutes before.',
    );
  if (form.callListMinutesBefore >= question)
    refuse('callListMinutesBefore', 'The call comes after the question: fewer minutes before.');
}

function isZone(zone: string): boolean {
  try {
    validateZone(zone);
    return true;
  } catch {
    return false;
  }
}
