import type {
  Consequences,
  ProfileCheck,
  ProfileDetail,
  ProfileValues,
  SignVersionRequest,
  VersionList,
} from '../../shared/contracts/protocols';
import { addDays } from '../../shared/domain/day';
import { laboratoryCutOffAt } from '../../shared/domain/laboratory-day';
import {
  publishedLaboratoryValues,
  type PublishedValue,
} from '../../shared/domain/published-laboratory';
import {
  resultStages,
  specimenClocks,
  type LaboratoryProfile,
} from '../../shared/domain/specimen-clocks';
import { instantOf, millisecondsPerMinute, weekdayOf } from '../../shared/domain/zone';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { select } from '../database/connection';
import { siteOf, type Site } from '../sites/sites';
import { clockExplained, dueDayExplained } from '../specimens/explain-specimen';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { minutesInWords } from '../wording/clinic-measures';
import { profileDifferences } from './differences';
import {
  firstProfileValues,
  profileFrom,
  profileProblems,
  profileRowOf,
  profileValuesOf,
} from './profile-values';
import { whenOf } from './protocol-desk';
import { signVersion } from './sign-version';
import {
  discardDraft,
  listVersions,
  makeDraft,
  profileKind,
  saveDraft,
  todayAt,
  toSignedVersion,
  versionInForce,
  versionOf,
} from './versions';

const daysAhead = 7;

export const listProfiles = (context: Context, staff: StaffMember): Promise<VersionList> =>
  listVersions(context, profileKind, clinicWords(staff.language), staff.siteId);

export async function openProfile(
  context: Context,
  staff: StaffMember,
  id: number,
): Promise<ProfileDetail> {
  const { db } = context;
  const words = clinicWords(staff.language);
  const row = await versionOf(db, profileKind, staff.siteId, id);
  const when = await whenOf(context, profileKind, staff.siteId);
  const inForce = await versionInForce(db, profileKind, staff.siteId, when.today);
  const values = profileValuesOf(row);
  return {
    ...toSignedVersion(words, row, when.today, inForce?.id),
    draftVersion: row.draft_version,
    values,
    problems: row.signed_at === null ? profileProblems(words, values, when) : [],
  };
}

/** From the profile in force, or from numbers of published ranges where there is none. */
export async function draftProfile(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  submissionKey: string,
): Promise<ProfileDetail> {
  const today = await todayAt(context, staff.siteId);
  const inForce = await versionInForce(context.db, profileKind, staff.siteId, today);
  const values = inForce
    ? { ...profileValuesOf(inForce), effectiveOn: addDays(today, daysAhead) }
    : firstProfileValues(today);
  const draft = profileRowOf(values);
  const id = await makeDraft(context, profileKind, actor, staff, submissionKey, draft);
  return openProfile(context, staff, id);
}

export async function saveProfile(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  which: { readonly id: number; readonly draftVersion: number },
  values: ProfileValues,
): Promise<ProfileDetail> {
  await saveDraft(context, profileKind, actor, staff, which, profileRowOf(values));
  return openProfile(context, staff, which.id);
}

export const discardProfile = (
  context: Context,
  actor: Actor,
  staff: StaffMember,
  which: { readonly id: number; readonly draftVersion: number },
): Promise<{ done: true }> => discardDraft(context, profileKind, actor, staff, which);

/** What stands beside values that nobody has saved: what to mend, what is published, and one worked specimen. */
export async function checkProfile(
  context: Context,
  staff: StaffMember,
  { version, values }: { readonly version: number; readonly values: ProfileValues },
): Promise<ProfileCheck> {
  const words = clinicWords(staff.language);
  const site = await siteOf(context.db, staff.siteId);
  const when = await whenOf(context, profileKind, staff.siteId);
  const problems = profileProblems(words, values, when);
  return {
    problems,
    published: publishedLaboratoryValues.map((value) => ({
      field: value.field,
      source: value.source,
      says: publishedSays(words, value),
    })),
    example: problems.length === 0 ? exampleOf(words, site, profileFrom(values, version)) : [],
  };
}

function publishedSays(words: ClinicWords, { field, from, to, note }: PublishedValue): string {
  const number = (value: number): string => {
    if (field === 'minimumVolumeMl' || field === 'maximumVolumeMl') return `${value} mL`;
    if (field === 'neutraliseWithinMinutes' || field === 'receiptWithinMinutes')
      return minutesInWords(words, value);
    return words.text('clinic.days', { count: value });
  };
  const range =
    from === null
      ? []
      : [
          to === null || to === from
            ? number(from)
            : words.text('clinic.published.between', { from: number(from), to: number(to) }),
        ];
  return [...range, ...(note === null ? [] : [words.text(`clinic.published.note.${note}`)])].join(
    '; ',
  );
}

/** A specimen of the first arrival on the next receiving day, received in the last minute. */
function exampleOf(words: ClinicWords, site: Site, profile: LaboratoryProfile): string[] {
  const { zone } = site;
  const days = Array.from({ length: 7 }, (_, ahead) => addDays(profile.effectiveOn, ahead));
  const on = days.find((day) => profile.receivingWeekdays.includes(weekdayOf(day)));
  if (on === undefined) return [];
  const arrivalAt = instantOf({ on, time: site.arrivals.from, zone });
  const collectedAt = arrivalAt + site.usualWaitMinutes * millisecondsPerMinute;
  const cutOffAt = laboratoryCutOffAt({ profile, on, zone });
  const done = { neutralisedAt: null, pickedUpAt: null, receivedAt: null };
  const clocks = specimenClocks({ profile, collectedAt, cutOffAt, ...done, now: collectedAt });
  const explained = { ...profile, zone };
  return [
    ...clocks.map((clock) => clockExplained(words, explained, clock)),
    ...resultStages.map((stage) => dueDayExplained(words, explained, on, stage)),
  ].map(({ says = '' }) => says);
}

export async function profileConsequences(
  context: Context,
  staff: StaffMember,
  id: number,
): Promise<Consequences> {
  const { db, clock } = context;
  const { siteId } = staff;
  const words = clinicWords(staff.language);
  const row = await versionOf(db, profileKind, siteId, id);
  const values = profileValuesOf(row);
  const before = await versionInForce(db, profileKind, siteId, values.effectiveOn);
  const [planned] = await select<{ count: number }>(
    db,
    `SELECT COUNT(*) AS count FROM mornings WHERE site_id = :siteId AND planned_on >= :from AND state = 'planned'
       AND arrival_at > :now`,
    { siteId, from: values.effectiveOn, now: new Date(clock.now()) },
  );
  const count = planned?.count ?? 0;
  const differences = profileDifferences(words, before && profileValuesOf(before), values);
  const key = count === 0 ? 'no-mornings' : 'specimens';
  return {
    draftVersion: row.draft_version,
    against: before
      ? words.text('clinic.signing.against', { version: before.version, title: before.title })
      : null,
    differences,
    mornings: [{ says: words.text(`clinic.signing.${key}`, { count }), needsCare: false }],
    plannedMornings: count,
    changedMornings: differences.length === 0 ? 0 : count,
    problems: profileProblems(words, values, await whenOf(context, profileKind, siteId)),
  };
}

/** Signs; specimens of mornings from its day on are held against it. @throws Problem as `signVersion`. */
export async function signProfile(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  id: number,
  request: SignVersionRequest,
): Promise<ProfileDetail> {
  const words = clinicWords(staff.language);
  const when = await whenOf(context, profileKind, staff.siteId);
  await signVersion(context, actor, staff, id, request, {
    kind: profileKind,
    problems: (row) => profileProblems(words, profileValuesOf(row), when),
    // Nothing that a family is told depends on the laboratory.
    after: () => Promise.resolve(),
  });
  return openProfile(context, staff, id);
}
