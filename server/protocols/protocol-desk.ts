import type {
  BandBeside,
  CheckProtocolRequest,
  ProtocolCheck,
  ProtocolDetail,
  ProtocolValues,
  VersionList,
} from '../../shared/contracts/protocols';
import type { checkProtocolRequest } from '../../shared/contracts/protocols';
import type { z } from 'zod';
import { addDays } from '../../shared/domain/day';
import { startingProtocol } from '../../shared/domain/fasting-protocol';
import {
  anaesthesiaFasts,
  publishedFasts,
  publishedFor,
  type PublishedHours,
} from '../../shared/domain/published-fasting';
import { languages } from '../../shared/languages/languages';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { siteOf } from '../sites/sites';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { ageOfBand } from './band-words';
import { previewOf } from './preview-night';
import { protocolProblems, protocolRowOf, protocolValuesOf, type When } from './protocol-values';
import {
  discardDraft,
  listVersions,
  makeDraft,
  protocolKind,
  saveDraft,
  todayAt,
  toSignedVersion,
  versionInForce,
  versionOf,
  type Kind,
} from './versions';

/** A draft leaves this many days to tell everybody, unless the clinician chooses another day. */
const daysAhead = 7;

export const listProtocols = (context: Context, staff: StaffMember): Promise<VersionList> =>
  listVersions(context, protocolKind, clinicWords(staff.language), staff.siteId);

/** From which day a version may be in force. */
export async function whenOf(context: Context, kind: Kind, siteId: number): Promise<When> {
  const today = await todayAt(context, siteId);
  const inForce = await versionInForce(context.db, kind, siteId, today);
  return { today, earliest: inForce ? addDays(today, 1) : today };
}

export async function openProtocol(
  context: Context,
  staff: StaffMember,
  id: number,
): Promise<ProtocolDetail> {
  const { db } = context;
  const words = clinicWords(staff.language);
  const row = await versionOf(db, protocolKind, staff.siteId, id);
  const when = await whenOf(context, protocolKind, staff.siteId);
  const inForce = await versionInForce(db, protocolKind, staff.siteId, when.today);
  const values = protocolValuesOf(row);
  return {
    ...toSignedVersion(words, row, when.today, inForce?.id),
    draftVersion: row.draft_version,
    values,
    problems:
      row.signed_at === null
        ? protocolProblems(words, values, await siteOf(db, staff.siteId), when)
        : [],
  };
}

/** From the version in force, or from the starting values where there is none. */
export async function draftProtocol(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  submissionKey: string,
): Promise<ProtocolDetail> {
  const today = await todayAt(context, staff.siteId);
  const inForce = await versionInForce(context.db, protocolKind, staff.siteId, today);
  const values = inForce ? protocolValuesOf(inForce) : startingValues(today);
  const effectiveOn = inForce ? addDays(today, daysAhead) : today;
  const draft = protocolRowOf({ ...values, effectiveOn });
  const id = await makeDraft(context, protocolKind, actor, staff, submissionKey, draft);
  return openProtocol(context, staff, id);
}

function startingValues(effectiveOn: string): ProtocolValues {
  return {
    title: startingProtocol.title,
    effectiveOn,
    usualWaitMinutes: startingProtocol.usualWaitMinutes,
    eatAgainAfterMinutes: startingProtocol.eatAgainAfterMinutes,
    allowedItems: [...startingProtocol.allowedItems],
    individualPlanCautions: [...startingProtocol.individualPlanCautions],
    wakeToCollectionMinutes: startingProtocol.wakeToCollectionMinutes,
    bands: startingProtocol.bands.map((band) => ({
      ...band,
      leastHours: band.leastHours ? { ...band.leastHours } : null,
    })),
  };
}

export async function saveProtocol(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  which: { readonly id: number; readonly draftVersion: number },
  values: ProtocolValues,
): Promise<ProtocolDetail> {
  await saveDraft(context, protocolKind, actor, staff, which, protocolRowOf(values));
  return openProtocol(context, staff, which.id);
}

export const discardProtocol = (
  context: Context,
  actor: Actor,
  staff: StaffMember,
  which: { readonly id: number; readonly draftVersion: number },
): Promise<{ done: true }> => discardDraft(context, protocolKind, actor, staff, which);

/** What stands beside values that nobody has saved: what to mend, what is published, what families would read. */
export async function checkProtocol(
  context: Context,
  staff: StaffMember,
  { values, preview }: z.output<typeof checkProtocolRequest>,
): Promise<ProtocolCheck> {
  const words = clinicWords(staff.language);
  const site = await siteOf(context.db, staff.siteId);
  const when = await whenOf(context, protocolKind, staff.siteId);
  return {
    problems: protocolProblems(words, values, site, when),
    bands: values.bands.map((band) => besideBand(words, band)),
    anaesthesia: anaesthesiaFasts.map(({ id, hours }) =>
      words.text(`clinic.published.anaesthesia.${id}`, { hours: hoursSay(words, hours) }),
    ),
    preview: preview && (await previewOf(context, words, site, values, preview)),
    languages: languages
      .filter(({ isBuilt }) => isBuilt)
      .map(({ id, nativeName }) => ({ id, name: nativeName })),
  };
}

export type PreviewWanted = NonNullable<CheckProtocolRequest['preview']>;

const hoursSay = (words: ClinicWords, { from, to }: PublishedHours): string =>
  to === null
    ? words.text('clinic.published.at-least', { from: String(from) })
    : words.text('clinic.published.from-to', { from: String(from), to: String(to) });

function besideBand(words: ClinicWords, band: ProtocolValues['bands'][number]): BandBeside {
  const { least, leastRange, monitoredHours } = publishedFor(band);
  return {
    age: ageOfBand(words, band),
    leastSays: words.text('clinic.published.least', {
      from: String(leastRange.from),
      to: String(leastRange.to),
    }),
    longestSays: words.text('clinic.published.longest', { hours: String(monitoredHours) }),
    sources: least.map(({ id, hours }) => ({
      source: publishedFasts.find((one) => one.id === id)?.source ?? id,
      says: words.text(`clinic.published.says.${id}`, { hours: hoursSay(words, hours) }),
    })),
  };
}
