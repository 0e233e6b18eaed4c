import type { Transaction } from 'sequelize';
import type { FamilySession } from '../../shared/contracts/family-session';
import { minutesOfTime } from '../../shared/domain/day';
import { instantOf, localPartsOf } from '../../shared/domain/zone';
import { familyTime } from '../../shared/languages/family-time';
import type { Context } from '../context';
import { shownPhone } from '../messages/shown-phone';
import { sitesOf } from '../sites/sites';
import type { Site } from '../sites/sites';
import { canSpeak, loadWording } from '../wording/render';
import type { Wording } from '../wording/render';

export type ClinicForFamily = FamilySession['clinic'];

/** The words of the family's language; null when nothing can be said in it here yet. */
export async function wordingFor(
  context: Context,
  language: string,
  transaction?: Transaction,
): Promise<Wording | null> {
  return canSpeak(language) ? loadWording(context.db, language, transaction) : null;
}

/** How a family reaches the clinic now, without a word about a child. `siteId` null: the installation's first site. */
export async function clinicForFamily(
  context: Context,
  siteId: number | null,
  language: string,
): Promise<ClinicForFamily> {
  const [site] = await sitesOf(context.db, siteId === null ? undefined : [siteId]);
  if (!site) return { shortName: '', phone: '', phoneSays: '', emergencyNumber: '' };
  const wording = await wordingFor(context, language);
  return {
    shortName: site.shortName,
    phone: shownPhone(site.phone, site.country),
    phoneSays: wording ? phoneSays(site, wording, context.clock.now()) : '',
    emergencyNumber: site.emergencyNumber,
  };
}

/** Who answers the telephone now and until when; honest when nobody does. */
function phoneSays(site: Site, wording: Wording, now: number): string {
  const { on, hour, minute } = localPartsOf(now, site.zone);
  const minutes = hour * 60 + minute;
  const { from, until } = site.dawnPhone;
  const say = (key: string, time: string): string => {
    if (!wording.has(key)) return '';
    const at = instantOf({ on, time, zone: site.zone });
    return wording.text(key, {
      time: familyTime(at, site.zone, wording.profile).time,
    });
  };
  if (minutes < minutesOfTime(from)) return say('phone.says.closed', from);
  if (minutes < minutesOfTime(until)) return say('phone.says.open', until);
  return say('phone.says.closed-today', until);
}
