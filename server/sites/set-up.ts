import type { SetUp } from '../../shared/contracts/set-up';
import type { FastingBand } from '../../shared/domain/fasting-protocol';
import { dayOf } from '../../shared/domain/zone';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { profilesOfSite, protocolsOfSite, type StoredProfile } from '../protocols/protocols';
import { hoursInWords } from '../wording/clinic-measures';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { closuresOf, roomsOf, siteOf } from './sites';

/** Everything the clinic has set up for one site; whose values they are stands beside them. */
export async function readSetUp({ db, clock }: Context, staff: StaffMember): Promise<SetUp> {
  const site = await siteOf(db, staff.siteId);
  const words = clinicWords(staff.language);
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
      title: words.sentence(protocol.title),
      effectiveOn: protocol.effectiveOn,
      hasStartingValues: protocol.isStartingValues,
      signedBy: protocol.signedBy,
      signedAt: instantOrNull(protocol.signedAt),
      bands: protocol.bands.map((band) => ({
        age: ageOfBand(words, band),
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
      lines: linesOf(words, profile),
    })),
  };
}

const instantOrNull = (at: number | null): string | null =>
  at === null ? null : new Date(at).toISOString();

const yearsOrMonths = (words: ClinicWords, months: number): string =>
  months >= 12 && months % 12 === 0
    ? words.text('clinic.age.years', { count: months / 12 })
    : words.text('clinic.age.months', { count: months });

/** "under 3 months", "3 to 5 months", "1 year", "2 to 4 years", "5 years and over". */
export function ageOfBand(words: ClinicWords, { fromMonths, toMonths }: FastingBand): string {
  if (toMonths === null)
    return words.text('clinic.band.and-over', { age: yearsOrMonths(words, fromMonths) });
  const next = toMonths + 1;
  if (fromMonths === 0) return words.text('clinic.band.under', { age: yearsOrMonths(words, next) });
  if (fromMonths % 12 !== 0 || next % 12 !== 0 || toMonths < 12)
    return words.text('clinic.band.months', { from: fromMonths, to: toMonths });
  const years = { from: fromMonths / 12, to: next / 12 - 1 };
  return years.from === years.to
    ? yearsOrMonths(words, fromMonths)
    : words.text('clinic.band.years', years);
}

const stages = [
  'smear',
  'amplification',
  'culturePreliminary',
  'cultureIdentification',
  'susceptibility',
  'cultureNegativeFinal',
] as const satisfies readonly (keyof StoredProfile['resultDays'])[];

function linesOf(words: ClinicWords, profile: StoredProfile): { says: string; value: string }[] {
  const cutOffs = [...new Set(Object.values(profile.cutOffTimes))];
  const { neutraliseWithinMinutes: neutralise, resultDays } = profile;
  const line = (key: string, value: string): { says: string; value: string } => ({
    says: words.text(`clinic.profile.${key}`),
    value,
  });
  return [
    line('receives', words.list(profile.receivingWeekdays.map((day) => words.weekday(day)))),
    line(
      'last-receipt',
      cutOffs.length > 0 ? words.list(cutOffs) : words.text('clinic.profile.none'),
    ),
    line(
      'neutralise',
      neutralise === null
        ? words.text('clinic.profile.not-by-clinic')
        : hoursInWords(words, neutralise),
    ),
    line('receipt', hoursInWords(words, profile.receiptWithinMinutes)),
    line(
      'volume',
      words.text('clinic.profile.volume-range', {
        least: String(profile.minimumVolumeMl),
        most: String(profile.maximumVolumeMl),
      }),
    ),
    ...stages.map((stage) => line(stage, words.text('clinic.days', { count: resultDays[stage] }))),
  ];
}
