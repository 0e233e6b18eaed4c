import type { z } from 'zod';
import type { letterChoices } from '../../shared/contracts/letters';
import type { Sequelize, Transaction } from 'sequelize';
import { chooseLetter, type LetterChoice } from '../../shared/domain/letter-choice';
import { dueOn, type LaboratoryProfile } from '../../shared/domain/specimen-clocks';
import { dayOf } from '../../shared/domain/zone';
import { select } from '../database/connection';
import { shownPhone } from '../messages/shown-phone';
import { idInForce } from '../protocols/protocols';
import { seriesFactsOf, type SeriesFacts } from '../results/series-results';
import type { LetterFacts } from './letter-parts';

/** What the clinician has chosen so far. */
export type Choices = z.output<typeof letterChoices>;

export interface Recipient {
  readonly familyMemberId: number;
  readonly fullName: string;
  readonly language: string;
}

/** Everything a letter of one series is made from, except what the clinician chooses. */
export interface LetterCase {
  readonly series: SeriesFacts;
  readonly choice: LetterChoice;
  readonly childName: string;
  readonly bornOn: string;
  readonly siteName: string;
  readonly recipients: readonly Recipient[];
  readonly hasToldDanger: boolean;
  readonly facts: Omit<LetterFacts, 'signer' | 'today'>;
}

interface CaseRow {
  readonly full_name: string;
  readonly call_me: string;
  readonly born_on: string;
  readonly site_name: string;
  readonly zone: string;
  readonly country: string;
  readonly phone: string;
  readonly emergency_number: string;
  readonly profile: LaboratoryProfile;
}

/** The guardians who may read results; a helper never does. */
function recipientsOf(
  db: Sequelize,
  childId: number,
  transaction?: Transaction,
): Promise<Recipient[]> {
  return select<Recipient>(
    db,
    `SELECT family_members.id AS familyMemberId, family_members.full_name AS fullName,
       family_members.reads_language AS language
     FROM child_family_members JOIN family_members ON family_members.id = child_family_members.family_member_id
     WHERE child_family_members.child_id = :childId AND child_family_members.standing = 'guardian'
       AND child_family_members.sees_results = TRUE
     ORDER BY family_members.id`,
    { childId },
    transaction,
  );
}

interface DangerCall {
  readonly reason: 'positive-result' | 'critical-result';
  /** Names specimen, test and value: the same in every try of one call. */
  readonly detail: string | null;
  readonly outcome: string | null;
  readonly is_open: 0 | 1;
}

/**
 * Whether a person has told everything critical: no call about it is open, each ended in "told" (tries that reached
 * nobody count as tries) or was found needless by a clinician, and one about a positive, where there is any, in "told".
 */
async function hasToldDanger(
  db: Sequelize,
  seriesId: number,
  isPositive: boolean,
  transaction?: Transaction,
): Promise<boolean> {
  const calls = await select<DangerCall>(
    db,
    `SELECT reason, detail, outcome, done_at IS NULL AS is_open
     FROM call_tasks WHERE series_id = :seriesId AND reason IN ('positive-result', 'critical-result')`,
    { seriesId },
    transaction,
  );
  if (calls.some((call) => call.is_open === 1)) return false;
  const endedWell = new Set(
    calls
      .filter(({ outcome }) => outcome === 'told' || outcome === 'not-needed')
      .map(({ detail }) => detail),
  );
  if (calls.some(({ detail }) => !endedWell.has(detail))) return false;
  return calls.some(
    ({ reason, outcome }) => outcome === 'told' && (!isPositive || reason === 'positive-result'),
  );
}

function lastAnswerOn(series: SeriesFacts, row: CaseRow): string | null {
  const open = series.mornings.filter(
    (_morning, index) =>
      series.results.specimens[index]?.state === 'awaiting' ||
      series.results.specimens[index]?.state === 'planned',
  );
  if (open.length === 0 || open.some((morning) => morning.receivedAt === null)) return null;
  const days = open.flatMap(({ receivedAt }) =>
    receivedAt
      ? dueOn({
          profile: row.profile,
          receivedOn: dayOf(receivedAt.getTime(), row.zone),
          stage: 'cultureNegativeFinal',
        })
      : [],
  );
  return days.sort().at(-1) ?? null;
}

/** In force on the day of the last morning, whose answer comes last. */
const profileId = idInForce('laboratory_profiles', {
  siteId: 'series.site_id',
  on: '(SELECT MAX(planned_on) FROM mornings WHERE mornings.series_id = series.id)',
  otherwise: 'series.laboratory_profile_id',
});

/** @returns null when the series does not exist at this site. */
export async function letterCaseOf(
  db: Sequelize,
  siteId: number,
  seriesId: number,
  transaction?: Transaction,
): Promise<LetterCase | null> {
  const series = await seriesFactsOf(db, seriesId, transaction);
  if (!series || series.siteId !== siteId) return null;
  const [row] = await select<CaseRow>(
    db,
    `SELECT children.full_name, children.call_me, children.born_on, sites.name AS site_name, sites.zone, sites.country, sites.phone,
       sites.emergency_number, laboratory_profiles.body AS profile
     FROM series JOIN children ON children.id = series.child_id JOIN sites ON sites.id = series.site_id
       JOIN laboratory_profiles ON laboratory_profiles.id = ${profileId}
     WHERE series.id = :seriesId`,
    { seriesId },
    transaction,
  );
  if (!row) return null;
  const choice = chooseLetter(series.results);
  return {
    series,
    choice,
    childName: row.full_name,
    bornOn: row.born_on,
    siteName: row.site_name,
    recipients: await recipientsOf(db, series.childId, transaction),
    hasToldDanger: await hasToldDanger(db, seriesId, choice.positive, transaction),
    facts: {
      choice,
      callMe: row.call_me,
      zone: row.zone,
      mornings: series.mornings,
      specimens: series.results.specimens,
      planned: series.morningsPlanned,
      lastAnswerOn: lastAnswerOn(series, row),
      clinicName: row.site_name,
      clinicPhone: shownPhone(row.phone, row.country),
      emergencyNumber: row.emergency_number,
    },
  };
}
