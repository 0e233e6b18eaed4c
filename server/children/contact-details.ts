import { parsePhoneNumberFromString, type CountryCode } from 'libphonenumber-js';
import type { z } from 'zod';
import type { familyMemberInput } from '../../shared/contracts/children';
import { isLanguageId } from '../../shared/languages/languages';
import type { FieldError } from '../http/problem';

export type FamilyMemberDetails = z.output<typeof familyMemberInput>;

/** The number as E.164, read as a number of this country when it has no country code; null when it cannot be one. */
export function internationalPhone(phone: string, country: string): string | null {
  const parsed = parsePhoneNumberFromString(phone, country as CountryCode);
  return parsed?.isPossible() ? parsed.number : null;
}

/**
 * What the shapes of the fields alone do not show. The phone comes back as E.164.
 * @param path of the family member in the request, empty when it is the request itself
 */
export function checkedFamilyMember(
  member: FamilyMemberDetails,
  country: string,
  path = '',
): { readonly member: FamilyMemberDetails; readonly errors: readonly FieldError[] } {
  const errors: FieldError[] = [];
  const refuse = (field: string, message: string): void => {
    errors.push({ path: path === '' ? field : `${path}.${field}`, message });
  };
  const phone = member.phone === null ? null : internationalPhone(member.phone, country);
  if (member.phone !== null && phone === null)
    refuse('phone', 'This number is too short, too long or lacks its area code.');
  if (!isLanguageId(member.readsLanguage))
    refuse('readsLanguage', 'Choose a language of the list.');
  if (member.standing === 'helper' && member.mayConsent)
    refuse('mayConsent', 'Only a guardian can consent; a helper brings the child.');
  if (member.agreesToTexts && member.phone === null)
    refuse('agreesToTexts', 'Texts need a telephone number.');
  if (member.agreesToEarlyTexts && !member.agreesToTexts)
    refuse('agreesToEarlyTexts', 'Texts before 8 in the morning need the yes to texts as well.');
  if (member.agreesToMail && member.email === null)
    refuse('agreesToMail', 'E-mail needs an e-mail address.');
  return { member: { ...member, phone }, errors };
}
