import type { z } from 'zod';
import type { endCollectionRequest, MorningChanged } from '../../shared/contracts/this-morning';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, select } from '../database/connection';
import { changedMeanwhile, invalid, Problem, type FieldError } from '../http/problem';
import { announce } from '../live/announce';
import { laboratoryProfileOf, type StoredProfile } from '../protocols/protocols';
import { minutesInWords } from '../wording/clinic-measures';
import type { ClinicWords } from '../wording/clinic-words';
import { changeMorning, updateMorning, type ChangeStep, type StepDone } from './morning-change';

export type EndCollectionInput = z.output<typeof endCollectionRequest>;
type Collected = Extract<EndCollectionInput, { outcome: 'collected' }>;

const minute = 60_000;
/** Clocks on the wall and in the machine differ a little. */
const slackMinutes = 2;

interface EndedRow {
  begun_at: Date;
  ended_at: Date | null;
  outcome: 'collected' | 'not-collected' | null;
  not_collected_reason: string | null;
  collected_at: Date | null;
  volume_ml: string | null;
}

/**
 * Collected, which makes the specimen, or not collected and why. Numbers outside the laboratory's profile warn and
 * never block care.
 */
export function endCollection(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  morningId: number,
  input: EndCollectionInput,
): Promise<MorningChanged> {
  return changeMorning(context, actor, staff, morningId, 'collection-ended', async (step) => {
    const ended = await collectionOf(context, step);
    if (!ended) throw new Problem(409, 'not-begun', 'Begin the collection first.');
    if (ended.ended_at !== null) {
      if (isSame(ended, input)) return { isRepeated: true };
      throw changedMeanwhile();
    }
    await updateMorning(context.db, step, input.version, { state: input.outcome });
    const done =
      input.outcome === 'collected'
        ? await keepSpecimen(context, step, ended, input)
        : await keepReason(context, step, input.reason);
    await moveSeriesOn(context, step);
    return done;
  });
}

async function collectionOf(
  context: Context,
  { plan, transaction }: ChangeStep,
): Promise<EndedRow | null> {
  const [row] = await select<EndedRow>(
    context.db,
    `SELECT begun_at, ended_at, outcome, not_collected_reason, specimens.collected_at, specimens.volume_ml
     FROM collections LEFT JOIN specimens ON specimens.morning_id = collections.morning_id
     WHERE collections.morning_id = :morningId`,
    { morningId: plan.morningId },
    transaction,
  );
  return row ?? null;
}

function isSame(ended: EndedRow, input: EndCollectionInput): boolean {
  if (ended.outcome !== input.outcome) return false;
  if (input.outcome === 'not-collected') return ended.not_collected_reason === input.reason;
  return (
    ended.collected_at?.getTime() === Date.parse(input.collectedAt) &&
    Number(ended.volume_ml) === input.volumeMl
  );
}

async function keepReason(
  context: Context,
  { plan, now, transaction }: ChangeStep,
  reason: string,
): Promise<StepDone> {
  await change(
    context.db,
    `UPDATE collections SET ended_at = :now, outcome = 'not-collected', not_collected_reason = :reason,
       version = version + 1 WHERE morning_id = :morningId`,
    { now: new Date(now), reason, morningId: plan.morningId },
    transaction,
  );
  return { detail: { outcome: 'not-collected' } };
}

async function keepSpecimen(
  context: Context,
  step: ChangeStep,
  { begun_at }: EndedRow,
  input: Collected,
): Promise<StepDone> {
  const { plan, now, transaction } = step;
  const faults = timeFaults(input, begun_at.getTime(), now);
  if (input.label !== null && (await isLabelUsed(context, step, input.label)))
    faults.push({
      path: 'label',
      message: 'This label is on another specimen. Scan and look again.',
    });
  if (faults.length > 0) throw invalid(faults);
  await change(
    context.db,
    `UPDATE collections SET ended_at = :now, outcome = 'collected', tube_size_fr = :tubeSizeFr,
       position_check = :positionCheck, rinse_fluid = :rinseFluid, rinse_ml = :rinseMl, tries = :tries,
       tolerance = :tolerance, version = version + 1 WHERE morning_id = :morningId`,
    { ...input, now: new Date(now), morningId: plan.morningId },
    transaction,
  );
  const number = await nextSpecimenNumber(context, step);
  await context.db.query(
    `INSERT INTO specimens (series_id, morning_id, child_id, number, label, volume_ml, collected_at, neutralised_at,
       neutralised_with)
     VALUES (:seriesId, :morningId, :childId, :number, :label, :volumeMl, :collectedAt, :neutralisedAt, :neutralisedWith)`,
    {
      replacements: {
        seriesId: plan.seriesId,
        morningId: plan.morningId,
        childId: plan.childId,
        number,
        label: input.label,
        volumeMl: input.volumeMl,
        collectedAt: new Date(input.collectedAt),
        neutralisedAt: input.neutralisedAt === null ? null : new Date(input.neutralisedAt),
        neutralisedWith: input.neutralisedWith,
      },
      transaction,
    },
  );
  await announce(context.db, transaction, 'specimens');
  const profile = await laboratoryProfileOf(context.db, plan.laboratoryProfileId, transaction);
  return {
    warnings: warningsFor(step.words, input, profile),
    detail: { outcome: 'collected', number, volumeMl: input.volumeMl },
  };
}

function timeFaults(input: Collected, begunAt: number, now: number): FieldError[] {
  const faults: FieldError[] = [];
  const collectedAt = Date.parse(input.collectedAt);
  if (collectedAt > now + slackMinutes * minute)
    faults.push({ path: 'collectedAt', message: 'This time has not come yet.' });
  if (collectedAt < begunAt - slackMinutes * minute)
    faults.push({ path: 'collectedAt', message: 'This is before the collection began.' });
  if (input.neutralisedAt === null) return faults;
  const neutralisedAt = Date.parse(input.neutralisedAt);
  if (neutralisedAt > now + slackMinutes * minute)
    faults.push({ path: 'neutralisedAt', message: 'This time has not come yet.' });
  if (neutralisedAt < collectedAt)
    faults.push({ path: 'neutralisedAt', message: 'This is before the specimen was collected.' });
  return faults;
}

async function isLabelUsed(
  context: Context,
  { transaction }: ChangeStep,
  label: string,
): Promise<boolean> {
  const rows = await select<{ id: number }>(
    context.db,
    'SELECT id FROM specimens WHERE label = :label',
    { label },
    transaction,
  );
  return rows.length > 0;
}

/** Specimens of a series count on from the highest; what was taken keeps its number, whatever morning was lost. */
async function nextSpecimenNumber(
  context: Context,
  { plan, transaction }: ChangeStep,
): Promise<number> {
  await context.db.query('SELECT id FROM series WHERE id = :seriesId FOR UPDATE', {
    replacements: { seriesId: plan.seriesId },
    transaction,
  });
  const [row] = await select<{ highest: number | null }>(
    context.db,
    'SELECT MAX(number) AS highest FROM specimens WHERE series_id = :seriesId',
    { seriesId: plan.seriesId },
    transaction,
  );
  return (row?.highest ?? 0) + 1;
}

/** The limits are the signed laboratory profile's. */
function warningsFor(words: ClinicWords, input: Collected, profile: StoredProfile): string[] {
  const warnings: string[] = [];
  const laboratory = profile.name;
  const warn = (key: string, params: Readonly<Record<string, string>> = {}): void => {
    warnings.push(words.text(`clinic.warning.${key}`, { laboratory, ...params }));
  };
  if (input.volumeMl < profile.minimumVolumeMl)
    warn('little-volume', { limit: String(profile.minimumVolumeMl) });
  if (input.volumeMl > profile.maximumVolumeMl)
    warn('much-volume', { limit: String(profile.maximumVolumeMl) });
  if (profile.neutraliseWithinMinutes !== null && input.neutralisedAt !== null) {
    const minutes = Math.round(
      (Date.parse(input.neutralisedAt) - Date.parse(input.collectedAt)) / minute,
    );
    if (minutes > profile.neutraliseWithinMinutes)
      warn('neutralised-late', {
        minutes: minutesInWords(words, minutes),
        limit: String(profile.neutraliseWithinMinutes),
      });
  }
  if (input.label === null) warn('not-labelled');
  return warnings;
}

/** When no morning is left and something was collected, the series waits for its results. */
async function moveSeriesOn(context: Context, { plan, transaction }: ChangeStep): Promise<void> {
  await change(
    context.db,
    `UPDATE series SET state = 'awaiting-results', version = version + 1
     WHERE id = :seriesId AND state IN ('planned', 'collecting')
       AND NOT EXISTS (SELECT 1 FROM mornings WHERE series_id = :seriesId AND state IN ('planned', 'here', 'collecting'))
       AND EXISTS (SELECT 1 FROM specimens WHERE series_id = :seriesId)`,
    { seriesId: plan.seriesId },
    transaction,
  );
}
