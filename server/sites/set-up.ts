import type { PlacesOfCountry, SetUp } from '../../shared/contracts/set-up';
import { dayOf } from '../../shared/domain/zone';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { ageOfBand } from '../protocols/band-words';
import { profilesOfSite, protocolsOfSite, type StoredProfile } from '../protocols/protocols';
import { hoursInWords } from '../wording/clinic-measures';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { countriesOf, regionsOf } from './public-holidays';
import { emergencyNumberOf } from './rule-packs';
import { calendarOf } from './site-calendar';
import { allRoomsOf, siteOf, sitesOf } from './sites';

/**
 * Everything the clinic has set up for one site, by default the own one; whose values they are stands beside them.
 * @throws Problem 404
 */
export async function readSetUp(
  { db, clock }: Context,
  staff: StaffMember,
  siteId = staff.siteId,
): Promise<SetUp> {
  const site = await siteOf(db, siteId);
  const words = clinicWords(staff.language);
  const today = dayOf(clock.now(), site.zone);
  const [sites, rooms, calendar, protocols, profiles] = await Promise.all([
    sitesOf(db),
    allRoomsOf(db, site.id),
    calendarOf(db, site, today, words),
    protocolsOfSite(db, site.id),
    profilesOfSite(db, site.id),
  ]);
  const { clinicWeekdays, dawnLanguages, ...facts } = site;
  return {
    sites: sites.map(({ id, name }) => ({ id, name })),
    site: { ...facts, clinicWeekdays: [...clinicWeekdays], dawnLanguages: [...dawnLanguages] },
    rooms: rooms.map(({ air, ...room }) => ({
      ...room,
      closure: air ? { by: 'air', ...air } : { by: 'minutes', minutes: room.closureMinutes },
    })),
    ...calendar,
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

/** What can be chosen for a site of this country. */
export function placesOf(country: string, language: string): PlacesOfCountry {
  const regions = Object.entries(regionsOf(country, language));
  return {
    countries: Object.keys(countriesOf()).sort(),
    regions: regions
      .map(([code, name]) => ({ code, name }))
      .sort((left, right) => left.name.localeCompare(right.name, language)),
    emergencyNumber: emergencyNumberOf(country),
  };
}
