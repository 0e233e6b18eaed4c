import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type {
  IndividualPlans,
  signIndividualPlanRequest,
} from '../../shared/contracts/individual-plans';
import { individualPlanProblems } from '../../shared/domain/individual-plan';
import { dayOf } from '../../shared/domain/zone';
import { recordViewOnce } from '../access-record/record-view-once';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { childInReach, type ReachedChild } from '../children/reach';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { planExplained } from '../fasting/explain-fast';
import { addOnce } from '../http/add-once';
import { changedMeanwhile, invalid, notFound } from '../http/problem';
import { announce } from '../live/announce';
import { planHouseholdMessages } from '../messages/plan-messages';
import { morningPlansOf, type MorningPlan } from '../series/morning-plans';
import { siteOf } from '../sites/sites';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { storedPlansOf, type StoredPlan } from './stored-plans';

export type SignPlan = z.output<typeof signIndividualPlanRequest>;

/** A child's own plans, what the next morning goes by, and why it needs one. */
export async function readIndividualPlans(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  childId: number,
): Promise<IndividualPlans> {
  const { db, clock } = context;
  const child = await childInReach(db, staff, childId);
  const words = clinicWords(staff.language);
  const site = await siteOf(db, child.siteId);
  const [versions, toCome, series, [named]] = await Promise.all([
    storedPlansOf(db, [childId]),
    morningsToCome(context, child),
    seriesOf(context, childId),
    select<{ fullName: string }>(
      db,
      'SELECT full_name AS fullName FROM children WHERE id = :childId',
      { childId },
    ),
  ]);
  await recordViewOnce(context, actor, {
    matter: 'individual-plans',
    childIds: [childId],
    at: clock.now(),
  });
  const missing = toCome.filter(({ plan }) => plan.kind === 'individual');
  const [next] = missing.length > 0 ? missing : toCome;
  const reasons = next?.plan.kind === 'individual' ? next.plan.reasons : [];
  return {
    childId,
    fullName: named?.fullName ?? '',
    isMissing: missing.length > 0,
    neededBecause: reasons.map((reason) => words.text(`clinic.individual.${reason}`)),
    explains: next ? planExplained(words, next) : [],
    versions: versions.map((version) => ({
      id: version.id,
      version: version.version,
      says: words.text('clinic.own-plan.version', {
        version: version.version,
        signer: version.signedBy,
        date: words.day(dayOf(version.signedAt, site.zone)),
      }),
      effectiveSays: effectiveSays(words, version, series),
      seriesId: version.seriesId,
      from: version.from,
      until: version.until,
      signedAt: new Date(version.signedAt).toISOString(),
      isInForce: toCome.some(({ individualPlan }) => individualPlan?.id === version.id),
      endedSays: version.isEnded
        ? words.text('clinic.own-plan.ended', { reason: version.endReason ?? '' })
        : null,
      body: {
        ...version.body,
        stops: [...version.body.stops],
        phrases: [...version.body.phrases],
        medicines: [...version.body.medicines],
      },
    })),
    series,
  };
}

function effectiveSays(
  words: ClinicWords,
  { seriesId, from, until }: StoredPlan,
  series: IndividualPlans['series'],
): string {
  if (seriesId !== null) {
    const date = series.find(({ id }) => id === seriesId)?.startsOn;
    return words.text('clinic.own-plan.for-series', { date: date ? words.day(date) : '' });
  }
  const params = { from: from ? words.day(from) : '', until: until ? words.day(until) : '' };
  const key = from && until ? 'between' : from ? 'from' : until ? 'until' : 'always';
  return words.text(`clinic.own-plan.${key}`, params);
}

/**
 * A clinician composes and signs in one step; the new version takes the place of earlier ones for the same mornings, and
 * what waits to be sent to the family is planned anew.
 * @throws Problem 404, 409 'changed-meanwhile' when a newer version exists, 422 for what must be mended.
 */
export async function signIndividualPlan(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  childId: number,
  request: SignPlan,
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  const child = await childInReach(db, staff, childId);
  const problems = individualPlanProblems(request.body);
  if (problems.length > 0)
    throw invalid(problems.map(({ path, message }) => ({ path: `body.${path}`, message })));
  if (request.seriesId !== null) {
    const series = await seriesOf(context, childId);
    if (!series.some(({ id }) => id === request.seriesId)) throw notFound('This series');
  }
  const submission = { matter: 'individual-plan', key: request.submissionKey, at: now };
  await addOnce(db, submission, async (transaction) => {
    await db.query('SELECT id FROM children WHERE id = :childId FOR UPDATE', {
      replacements: { childId },
      transaction,
    });
    const [newest] = await storedPlansOf(db, [childId], transaction);
    if ((newest?.version ?? 0) !== request.afterVersion) throw changedMeanwhile();
    const [id] = await db.query(
      `INSERT INTO individual_plans (child_id, version, series_id, effective_from, effective_until, body,
         signed_by_staff_id, signed_at)
       VALUES (:childId, :version, :seriesId, :from, :until, :body, :staffId, :now)`,
      {
        replacements: {
          childId,
          version: request.afterVersion + 1,
          seriesId: request.seriesId,
          from: request.from,
          until: request.until,
          body: JSON.stringify(request.body),
          staffId: staff.id,
          now: new Date(now),
        },
        transaction,
      },
    );
    const detail = { version: request.afterVersion + 1, seriesId: request.seriesId };
    await afterChange(context, transaction, actor, child, detail);
    return Number(id);
  });
}

/**
 * The plan no longer holds; where the child needs one, its mornings wait for a clinician again.
 * @throws Problem 404 for a plan of a child out of reach
 */
export async function endIndividualPlan(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  planId: number,
  reason: string,
): Promise<number> {
  const { db, clock } = context;
  const [found] = await select<{ child_id: number; version: number }>(
    db,
    'SELECT child_id, version FROM individual_plans WHERE id = :planId',
    { planId },
  );
  if (!found) throw notFound('This plan');
  const child = await childInReach(db, staff, found.child_id).catch(() => {
    throw notFound('This plan');
  });
  await inTransaction(db, async (transaction) => {
    const ended = await change(
      db,
      `UPDATE individual_plans SET ended_at = :now, ended_by_staff_id = :staffId, end_reason = :reason
       WHERE id = :planId AND ended_at IS NULL`,
      { planId, reason, staffId: staff.id, now: new Date(clock.now()) },
      transaction,
    );
    if (ended === 0) return;
    await afterChange(context, transaction, actor, child, { version: found.version, reason });
  });
  return found.child_id;
}

async function afterChange(
  context: Context,
  transaction: Transaction,
  actor: Actor,
  child: ReachedChild,
  detail: Readonly<Record<string, unknown>>,
): Promise<void> {
  const { db, clock } = context;
  await record(db, transaction, actor, {
    action: 'changed',
    matter: 'individual-plan',
    childIds: [child.id],
    detail,
    at: clock.now(),
  });
  await announce(db, transaction, 'children', child.id);
  const mornings = await morningsToCome(context, child, transaction);
  for (const { morningId } of mornings) await announce(db, transaction, 'mornings', morningId);
  for (const on of new Set(mornings.map((morning) => morning.on)))
    await planHouseholdMessages(context, transaction, { householdId: child.householdId, on });
}

/** The child's mornings that have not begun, in order. */
export async function morningsToCome(
  { db, clock }: Context,
  { id, householdId }: Pick<ReachedChild, 'id' | 'householdId'>,
  transaction?: Transaction,
): Promise<MorningPlan[]> {
  const plans = await morningPlansOf(db, { householdId }, transaction);
  return plans.filter(
    ({ childId, state, arrivalAt }) =>
      childId === id && state === 'planned' && arrivalAt > clock.now(),
  );
}

function seriesOf({ db }: Context, childId: number): Promise<IndividualPlans['series']> {
  return select(
    db,
    `SELECT series.id, MIN(mornings.planned_on) AS startsOn FROM series
     JOIN mornings ON mornings.series_id = series.id
     WHERE series.child_id = :childId AND series.state <> 'closed'
     GROUP BY series.id ORDER BY series.id DESC`,
    { childId },
  );
}
