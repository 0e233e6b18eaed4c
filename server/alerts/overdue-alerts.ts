import { dayOf, instantOf, localTimeOf } from '../../shared/domain/zone';
import { inTransaction } from '../database/connection';
import { resultsOfSpecimens } from '../results/current-results';
import { sitesOf } from '../sites/sites';
import { specimenRows, toSpecimen } from '../specimens/specimen-rows';
import { clinicWords } from '../wording/clinic-words';
import { raiseAlert } from './raise-alert';
import type { Surroundings } from './tell-alert';

/** A late report is no reason to wake anybody. */
const tellsFrom = '08:00';
const tellsUntil = '20:00';

/**
 * Final reports that the laboratory's own days have passed: one alert when another one becomes late, with how many are
 * late by then.
 */
export async function alertOverdue(context: Surroundings): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  const words = clinicWords('en');
  for (const site of await sitesOf(db)) {
    const time = localTimeOf(now, site.zone);
    if (time < tellsFrom || time >= tellsUntil) continue;
    const rows = await specimenRows(db, { siteId: site.id, isOpenOnly: true });
    const results = await resultsOfSpecimens(
      db,
      words,
      rows.map(({ id }) => id),
    );
    const overdue = rows
      .map((row) => toSpecimen(words, row, results.get(row.id) ?? [], now))
      .filter(({ isOverdue }) => isOverdue);
    const latest = overdue
      .map(({ finalExpectedOn }) => finalExpectedOn ?? '')
      .sort()
      .at(-1);
    if (latest === undefined) continue;
    await inTransaction(db, (transaction) =>
      raiseAlert(context, transaction, {
        kind: 'overdue-result',
        siteId: site.id,
        cause: latest,
        count: overdue.length,
        usefulUntil: instantOf({ on: dayOf(now, site.zone), time: tellsUntil, zone: site.zone }),
      }),
    );
  }
}
