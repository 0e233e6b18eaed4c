import type { SetUp } from '../../shared/contracts/set-up';
import type { FastingBand } from '../../shared/domain/fasting-protocol';
import { dayOf } from '../../shared/domain/zone';
import { listInWords, minutesInWords } from '../../shared/languages/clinic-words';
import { english } from '../../shared/languages/profiles/english';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { profilesOfSite, protocolsOfSite, type StoredProfile } from '../protocols/protocols';
import { closuresOf, roomsOf, siteOf } from './sites';

/** Everything the clinic has set up for one site; whose values they are stands beside them. */
export async function readSetUp({ db, clock }: Context, staff: StaffMember): Promise<SetUp> {
  const site = await siteOf(db, staff.siteId);
  const [rooms, closures, protocols, profiles] = await Promise.all([
    roomsOf(db, site.id),
    closuresOf(db, site.id, dayOf(clock.now(), site.zone)),
    protocolsOfSite(db, site.id),
    profilesOfSite(db, site.id),
  ]);
  return {
    site: {
      id: site.id,
      name: site.name,
      shortName: site.shortName,
      zone: site.zone,
      address: site.address,
      door: site.door,
      phone: site.phone,
      emergencyNumber: site.emergencyNumber,
      dawnPhone: site.dawnPhone,
      clinicWeekdays: [...site.clinicWeekdays],
      arrivals: site.arrivals,
      placesPerMorning: site.placesPerMorning,
      eveningTextTime: site.eveningTextTime,
      morningQuestionMinutesBefore: site.morningQuestionMinutesBefore,
      callListMinutesBefore: site.callListMinutesBefore,
    },
    rooms,
    closures: closures.map(({ on, reason }) => ({ on, reason })),
    protocols: protocols.map((protocol) => ({
      id: protocol.id,
      version: protocol.version,
      title: protocol.title,
      effectiveOn: protocol.effectiveOn,
      hasStartingValues: protocol.isStartingValues,
      signedBy: protocol.signedBy,
      signedAt: instantOrNull(protocol.signedAt),
      bands: protocol.bands.map((band) => ({
        age: ageOfBand(band),
        leastHours: band.leastHours ? Math.max(...Object.values(band.leastHours)) : null,
        longestHours: band.longestHours,
      })),
    })),
    laboratoryProfiles: profiles.map((profile) => ({
      id: profile.id,
      version: profile.version,
      name: profile.name,
      effectiveOn: profile.effectiveOn,
      signedBy: profile.signedBy,
      signedAt: instantOrNull(profile.signedAt),
      lines: linesOf(profile),
    })),
  };
}

const instantOrNull = (at: number | null): string | null =>
  at === null ? null : new Date(at).toISOString();

const yearsOrMonths = (months: number): string =>
  months >= 12 && months % 12 === 0
    ? `${months / 12} year${months === 12 ? '' : 's'}`
    : `${months} months`;

/** "under 3 months", "3 to 5 months", "1 year", "2 to 4 years", "5 years and over". */
export function ageOfBand({ fromMonths, toMonths }: FastingBand): string {
  if (toMonths === null) return `${yearsOrMonths(fromMonths)} and over`;
  const next = toMonths + 1;
  if (fromMonths === 0) return `under ${yearsOrMonths(next)}`;
  if (fromMonths % 12 !== 0 || next % 12 !== 0 || toMonths < 12)
    return `${fromMonths} to ${toMonths} months`;
  const years = { from: fromMonths / 12, to: next / 12 - 1 };
  return years.from === years.to ? yearsOrMonths(fromMonths) : `${years.from} to ${years.to} years`;
}

function linesOf(profile: StoredProfile): { says: string; value: string }[] {
  const weekdays = profile.receivingWeekdays.map((day) => english.weekdays[day - 1] ?? '');
  const cutOffs = [...new Set(Object.values(profile.cutOffTimes))];
  const { resultDays: days } = profile;
  return [
    { says: 'Receives on', value: listInWords(weekdays) },
    { says: 'Last receipt of the day', value: cutOffs.length > 0 ? listInWords(cutOffs) : 'none' },
    {
      says: 'Neutralise within',
      value:
        profile.neutraliseWithinMinutes === null
          ? 'not by the clinic'
          : minutesInWords(profile.neutraliseWithinMinutes),
    },
    { says: 'Receipt within', value: minutesInWords(profile.receiptWithinMinutes) },
    { says: 'Volume', value: `${profile.minimumVolumeMl} to ${profile.maximumVolumeMl} mL` },
    { says: 'Smear after', value: `${days.smear} days` },
    { says: 'Amplification after', value: `${days.amplification} days` },
    { says: 'Preliminary culture after', value: `${days.culturePreliminary} days` },
    { says: 'Identification after', value: `${days.cultureIdentification} days` },
    { says: 'Susceptibility after', value: `${days.susceptibility} days` },
    { says: 'Final negative culture after', value: `${days.cultureNegativeFinal} days` },
  ].map((line) => ({ ...line, value: line.value.replace(/^1 days$/, '1 day') }));
}
