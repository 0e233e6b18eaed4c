// The table of a run and its violations, as a person reads them.
import { rules } from './book-keeper/book-keeper.mjs';

const width = 54;
const line = (name, value) => `  ${name.padEnd(width)}${value}`;

/** @returns the whole text. */
export function tableOf({ options, tally, result, seen, tookMs, runMs }) {
  const { counts, violations } = result;
  const rate = Math.round((tally.mornings / (runMs / 60_000)) * 10) / 10;
  const kinds = Object.keys(counts.expected).sort();
  return [
    '',
    `Simulation: ${options.families} families, ${options.days} days from ${options.start}, seed ${options.seed}, faults ${options.faults ? 'on' : 'off'}`,
    '',
    'What was lived through',
    line(
      'families with mornings (without a place)',
      `${tally.families} (${tally.familiesWithoutPlace})`,
    ),
    line('mornings of children', tally.mornings),
    line('nights of households, judged', counts.days),
    line('mornings that the clinic closed at four', tally.closings),
    line('answers by page and by text', `${tally.answersByPage} and ${tally.answersByText}`),
    line('texts of families (written again)', `${tally.repliesIn} (${tally.repeatedTexts})`),
    line('requests (repeated)', `${tally.requests} (${tally.repeatedRequests})`),
    '',
    'Faults that happened',
    ...rowsOf({ ...tally.faultsDone, ...tally.falls }),
    '',
    'Expected messages                                         expected  arrived  call instead',
    ...kinds.map((kind) =>
      line(
        kind,
        [counts.expected[kind], counts.arrived[kind] ?? 0, counts.calledInstead[kind] ?? 0]
          .map((count) => String(count).padStart(8))
          .join('  '),
      ),
    ),
    ...rowsOf(
      Object.fromEntries(
        Object.entries(counts.calledInstead).filter(([name]) => name.endsWith('meanwhile')),
      ),
    ),
    '',
    'Received, by kind',
    ...rowsOf(counts.received),
    '',
    'Counted apart',
    line('e-mails again under the same Message-ID', counts.mailDoubles),
    line('reminders that a fault swallowed, without a call', counts.remindersWithoutCall),
    '',
    'Must be 0',
    ...Object.entries(rules).map(([rule, says]) =>
      line(says, violations.filter((one) => one.rule === rule).length),
    ),
    line('requests refused by the clinic', tally.refused.length),
    '',
    line(
      'wrongs that the book-keeper sees when put into its books',
      `${seen.passed} of ${seen.passed + seen.failed}`,
    ),
    ...seen.unseen.map((rule) => `UNSEEN ${rule}`),
    '',
    `  ${Math.round(tookMs / 1000)} s in all; ${tally.steps} steps of the clock, ${rate} mornings a minute;` +
      ` ${Math.round(tally.settleMs / 1000)} s of it waiting for the senders`,
    ...violations.map(
      ({ rule, family, household, on, at, says }) =>
        `VIOLATION ${rule}: family ${family} (household ${household}), morning ${on}: ${says}; ${new Date(at).toISOString()}`,
    ),
    ...tally.refused.map((says) => `REFUSED ${says}`),
  ].join('\n');
}

const rowsOf = (table) =>
  Object.entries(table)
    .sort(([one], [other]) => one.localeCompare(other))
    .map(([name, count]) => line(name, count));
