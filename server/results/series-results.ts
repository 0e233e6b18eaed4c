import type { Sequelize, Transaction } from 'sequelize';
import type { SeriesResults, SpecimenResults } from '../../shared/domain/letter-choice';
import { select } from '../database/connection';
import { currentResultRows, findingsOf, needsSecondLook, type ResultRow } from './current-results';

export interface SeriesFacts {
  readonly id: number;
  readonly childId: number;
  readonly householdId: number;
  readonly siteId: number;
  readonly version: number;
  readonly morningsPlanned: number;
  readonly isClosedEarly: boolean;
  readonly closeReason: string | null;
  readonly results: SeriesResults;
  /** A line a planned morning, in the order of `results.specimens`. */
  readonly mornings: readonly {
    readonly number: number;
    readonly on: string;
    readonly receivedAt: Date | null;
  }[];
  /** Current results of all specimens. */
  readonly rows: readonly ResultRow[];
  readonly specimenIds: readonly number[];
  readonly hasOpenSecondLook: boolean;
}

interface MorningRow {
  readonly number: number;
  readonly planned_on: string;
  readonly received_at: Date | null;
  readonly state: string;
  readonly specimen_id: number | null;
  readonly rejected_at: Date | null;
}

function specimenResults(morning: MorningRow, rows: readonly ResultRow[]): SpecimenResults {
  const findings = findingsOf(rows);
  const isFinal = rows.some((row) => row.test === 'culture' && row.finality === 'final');
  const state = ((): SpecimenResults['state'] => {
    if (morning.specimen_id === null)
      return ['lost', 'not-collected'].includes(morning.state) ? 'not-collected' : 'planned';
    if (morning.rejected_at !== null) return 'rejected';
    return isFinal ? 'reported' : 'awaiting';
  })();
  return {
    ...findings,
    state,
    finality: isFinal ? 'final' : 'preliminary',
    isHandEntered: rows.some((row) => row.finality === 'final'),
    hasChangedMeaning: rows.some((row) => row.correction_reason !== null),
  };
}

/**
 * The series as the letter choice needs it: a specimen a planned morning. A morning that was lost and planned again
 * counts once, by the later one.
 */
export async function seriesFactsOf(
  db: Sequelize,
  seriesId: number,
  transaction?: Transaction,
): Promise<SeriesFacts | null> {
  const [series] = await select<{
    id: number;
    child_id: number;
    household_id: number;
    site_id: number;
    version: number;
    mornings_planned: number;
    state: string;
    close_reason: string | null;
  }>(
    db,
    `SELECT series.id, series.child_id, children.household_id, series.site_id, series.version, series.mornings_planned,
       series.state, series.close_reason
     FROM series JOIN children ON children.id = series.child_id WHERE series.id = :seriesId`,
    { seriesId },
    transaction,
  );
  if (!series) return null;
  const mornings = await select<MorningRow>(
    db,
    `SELECT mornings.number, mornings.planned_on, mornings.state, specimens.id AS specimen_id, specimens.received_at,
       specimens.rejected_at
     FROM mornings LEFT JOIN specimens ON specimens.morning_id = mornings.id
     WHERE mornings.series_id = :seriesId ORDER BY mornings.number`,
    { seriesId },
    transaction,
  );
  const specimenIds = mornings.flatMap((morning) => morning.specimen_id ?? []);
  const rows = await currentResultRows(db, specimenIds, transaction);
  const replaced = Math.max(0, mornings.length - series.mornings_planned);
  const lost = mornings.filter(
    (morning) => morning.specimen_id === null && morning.state === 'lost',
  );
  const dropped = new Set(lost.slice(0, replaced));
  const taken = mornings.filter((morning) => !dropped.has(morning));
  const collected = taken.filter((morning) => morning.specimen_id !== null).length;
  return {
    id: series.id,
    childId: series.child_id,
    householdId: series.household_id,
    siteId: series.site_id,
    version: series.version,
    morningsPlanned: series.mornings_planned,
    isClosedEarly: series.state === 'closed' && collected < series.mornings_planned,
    closeReason: series.close_reason,
    results: {
      specimens: taken.map((morning) =>
        specimenResults(
          morning,
          rows.filter((row) => row.specimen_id === morning.specimen_id),
        ),
      ),
      isClosedEarly: series.state === 'closed' && collected < series.mornings_planned,
    },
    mornings: taken.map((morning) => ({
      number: morning.number,
      on: morning.planned_on,
      receivedAt: morning.received_at,
    })),
    rows,
    specimenIds,
    hasOpenSecondLook: rows.some(needsSecondLook),
  };
}
