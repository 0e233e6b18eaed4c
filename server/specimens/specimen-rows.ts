import type { Sequelize, Transaction } from 'sequelize';
import type { Result, Specimen } from '../../shared/contracts/specimens';
import {
  dueOn,
  isOverdue,
  resultStages,
  specimenClocks,
} from '../../shared/domain/specimen-clocks';
import type { LaboratoryProfile } from '../../shared/domain/specimen-clocks';
import { laboratoryCutOffAt } from '../../shared/domain/laboratory-day';
import { dayOf } from '../../shared/domain/zone';
import { select } from '../database/connection';
import {
  idInForce,
  wholeProfileBody,
  type ProfileBody,
  type StoredProfileBody,
} from '../protocols/protocols';
import type { ClinicWords } from '../wording/clinic-words';
import { clockExplained, dueDayExplained } from './explain-specimen';
import { specimenSays } from './specimen-says';

export interface SpecimenRow {
  readonly id: number;
  readonly version: number;
  readonly series_id: number;
  readonly morning_id: number;
  readonly child_id: number;
  readonly full_name: string;
  readonly born_on: string;
  readonly number: number;
  readonly mornings_planned: number;
  readonly label: string | null;
  readonly volume_ml: string;
  readonly collected_at: Date;
  readonly neutralised_at: Date | null;
  readonly neutralised_with: string | null;
  readonly handed_over_at: Date | null;
  readonly received_at: Date | null;
  readonly laboratory_number: string | null;
  readonly rejected_at: Date | null;
  readonly reject_reason: string | null;
  readonly zone: string;
  readonly site_id: number;
  /** In force on the day of the morning. */
  readonly profile: ProfileBody & Pick<LaboratoryProfile, 'version' | 'name'>;
}

type FoundRow = Omit<SpecimenRow, 'profile'> & {
  readonly profile_body: StoredProfileBody;
  readonly profile_version: number;
  readonly profile_name: string;
};

const profileId = idInForce('laboratory_profiles', {
  siteId: 'series.site_id',
  on: 'mornings.planned_on',
  otherwise: 'series.laboratory_profile_id',
});

export interface SpecimenWhere {
  readonly siteId: number;
  readonly id?: number;
  readonly seriesIds?: readonly number[];
  /** Leaves out series that are closed. */
  readonly isOpenOnly?: boolean;
}

/** Specimens of a site with what their clocks need, oldest first. */
export async function specimenRows(
  db: Sequelize,
  where: SpecimenWhere,
  transaction?: Transaction,
): Promise<SpecimenRow[]> {
  const conditions = ['series.site_id = :siteId'];
  if (where.id !== undefined) conditions.push('specimens.id = :id');
  if (where.seriesIds !== undefined) conditions.push('specimens.series_id IN (:seriesIds)');
  if (where.isOpenOnly) conditions.push("series.state <> 'closed'");
  if (where.seriesIds?.length === 0) return [];
  const rows = await select<FoundRow>(
    db,
    `SELECT specimens.id, specimens.version, specimens.series_id, specimens.morning_id, specimens.child_id,
       children.full_name, children.born_on, specimens.number, series.mornings_planned, specimens.label,
       specimens.volume_ml, specimens.collected_at, specimens.neutralised_at, specimens.neutralised_with,
       specimens.handed_over_at, specimens.received_at, specimens.laboratory_number, specimens.rejected_at,
       specimens.reject_reason, sites.zone, sites.id AS site_id,
       laboratory_profiles.body AS profile_body, laboratory_profiles.version AS profile_version,
       laboratory_profiles.name AS profile_name
     FROM specimens
       JOIN series ON series.id = specimens.series_id
       JOIN children ON children.id = specimens.child_id
       JOIN sites ON sites.id = series.site_id
       JOIN mornings ON mornings.id = specimens.morning_id
       JOIN laboratory_profiles ON laboratory_profiles.id = ${profileId}
     WHERE ${conditions.join(' AND ')}
     ORDER BY specimens.collected_at, specimens.id`,
    { ...where },
    transaction,
  );
  return rows.map(({ profile_body, profile_version, profile_name, ...row }) => ({
    ...row,
    profile: { ...wholeProfileBody(profile_body), version: profile_version, name: profile_name },
  }));
}

const iso = (date: Date | null): string | null => date?.toISOString() ?? null;

/** The specimen as screens see it. `results` is null where the reader may not see any. */
export function toSpecimen(
  words: ClinicWords,
  row: SpecimenRow,
  results: readonly Result[] | null,
  now: number,
): Specimen {
  const { profile, zone } = row;
  const collectedAt = row.collected_at.getTime();
  const cutOffAt = laboratoryCutOffAt({ profile, on: dayOf(collectedAt, zone), zone });
  const clocks = specimenClocks({
    profile,
    collectedAt,
    neutralisedAt: row.neutralised_at?.getTime() ?? null,
    pickedUpAt: row.handed_over_at?.getTime() ?? null,
    receivedAt: row.received_at?.getTime() ?? null,
    cutOffAt,
    now,
  });
  const explained = { ...profile, zone };
  const neutralise = clocks.find((clock) => clock.step === 'neutralise');
  const receipt = clocks.find((clock) => clock.step === 'receipt');
  const receiptBy = receipt?.dueAt ?? collectedAt;
  const neutraliseBy = neutralise?.dueAt ?? receiptBy;
  const receivedOn = row.received_at ? dayOf(row.received_at.getTime(), zone) : null;
  const finalExpectedOn =
    receivedOn !== null && !row.rejected_at
      ? dueOn({ profile, receivedOn, stage: 'cultureNegativeFinal' })
      : null;
  const isFinal = (results ?? []).some(
    (result) => result.test === 'culture' && result.finality === 'final',
  );
  const overdue =
    finalExpectedOn !== null &&
    results !== null &&
    isOverdue({ dueOn: finalExpectedOn, today: dayOf(now, zone), isReported: isFinal });
  return {
    id: row.id,
    version: row.version,
    seriesId: row.series_id,
    childId: row.child_id,
    childName: row.full_name,
    bornOn: row.born_on,
    number: row.number,
    ofPlanned: row.mornings_planned,
    label: row.label,
    volumeMl: Number(row.volume_ml),
    collectedAt: row.collected_at.toISOString(),
    neutralisedAt: iso(row.neutralised_at),
    neutralisedWith: row.neutralised_with,
    neutraliseBy: new Date(neutraliseBy).toISOString(),
    handedOverAt: iso(row.handed_over_at),
    receiptBy: new Date(receiptBy).toISOString(),
    receivedAt: iso(row.received_at),
    laboratoryNumber: row.laboratory_number,
    rejectedAt: iso(row.rejected_at),
    rejectReason: row.reject_reason,
    says: specimenSays(words, {
      zone,
      now,
      neutralisedAt: row.neutralised_at?.getTime() ?? null,
      neutraliseBy,
      mustBeNeutralised: neutralise !== undefined,
      handedOverAt: row.handed_over_at?.getTime() ?? null,
      receivedAt: row.received_at?.getTime() ?? null,
      receiptBy,
      rejectedAt: row.rejected_at?.getTime() ?? null,
      rejectReason: row.reject_reason,
      label: row.label,
      finalExpectedOn,
      isOverdue: overdue,
      isFinal,
    }),
    isLate: clocks.some((clock) => clock.state === 'late' && row.received_at === null),
    finalExpectedOn,
    isOverdue: overdue,
    explains: [
      ...clocks.map((clock) => clockExplained(words, explained, clock)),
      ...(receivedOn === null || row.rejected_at
        ? []
        : resultStages.map((stage) => dueDayExplained(words, explained, receivedOn, stage))),
    ],
    results: results === null ? null : [...results],
  };
}

/** 'Specimen clocks and final days: State laboratory, version 2, signed by Dr. Okafor on ...' */
export async function laboratorySays(
  db: Sequelize,
  siteId: number,
  words: ClinicWords,
): Promise<string> {
  const [row] = await select<{
    name: string;
    version: number;
    signer: string | null;
    signed_at: Date | null;
    zone: string;
  }>(
    db,
    `SELECT laboratory_profiles.name, laboratory_profiles.version, staff.full_name AS signer, signed_at, sites.zone
     FROM laboratory_profiles JOIN sites ON sites.id = laboratory_profiles.site_id LEFT JOIN staff ON staff.id = signed_by_staff_id
     WHERE site_id = :siteId AND signed_at IS NOT NULL ORDER BY version DESC LIMIT 1`,
    { siteId },
  );
  if (!row?.signed_at) return words.text('clinic.laboratory.unsigned');
  return words.text('clinic.laboratory.signed', {
    name: row.name,
    version: row.version,
    signer: row.signer ?? words.text('clinic.laboratory.a-clinician'),
    day: words.day(dayOf(row.signed_at.getTime(), row.zone)),
  });
}
