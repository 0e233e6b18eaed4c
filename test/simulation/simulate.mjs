// `npm run simulate -- --families 60 --days 60 --seed 7 --faults on`: families live through mornings with the
// real server, database and libraries; a book-keeper of its own says at the end whether any message was lost,
// doubled or should not have gone. `--start` names another Monday, `--books FILE` keeps what was compared.
import { writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { say } from '../../server/bootstrap/say.mjs';
import { compare, rules } from './book-keeper/book-keeper.mjs';
import { checkBookKeeper } from './doctored.mjs';
import { tableOf } from './report.mjs';
import { runDays } from './run.mjs';

/** The run that belongs to every test of everything. */
export const smallRun = { families: 12, days: 10, seed: 'small', faults: true };

/**
 * @returns `{ passed, failed }`, the rules that held and the faults that the book-keeper sees when they are put into the
 * books, and those that it does not; and the text to read
 */
export async function simulate({ start = defaultStart(), progress, ...given }) {
  const options = { ...given, start };
  const begunAt = performance.now();
  const { books, tally } = await runDays({ ...options, progress });
  const runMs = performance.now() - begunAt;
  if (options.booksFile) keepBooks(options.booksFile, books);
  const result = compare(books);
  const tookMs = performance.now() - begunAt;
  const broken = new Set(result.violations.map(({ rule }) => rule));
  if (tally.refused.length > 0) broken.add('refused');
  const seen = checkBookKeeper(books);
  return {
    passed: Object.keys(rules).length + 1 - broken.size + seen.passed,
    failed: broken.size + seen.failed,
    table: tableOf({ options, tally, result, seen, tookMs, runMs }),
  };
}

/** Everything the book-keeper read, for whoever looks into a violation. */
function keepBooks(file, books) {
  const plain = { ...books, states: Object.fromEntries(books.states) };
  writeFileSync(file, JSON.stringify(plain, null, 1), { mode: 0o600 });
}

/**
 * The Monday before the clocks of the United States go forward (second Sunday of March), the next that is at least two
 * weeks ahead: each run has that night in it.
 */
export function defaultStart(now = Date.now()) {
  const day = 86_400_000;
  for (let year = new Date(now).getUTCFullYear(); ; year += 1) {
    const first = Date.UTC(year, 2, 1);
    const firstSunday = (7 - new Date(first).getUTCDay()) % 7;
    const monday = first + (firstSunday + 7 - 6) * day;
    if (monday > now + 14 * day) return new Date(monday).toISOString().slice(0, 10);
  }
}

function optionsOf(args) {
  const { values } = parseArgs({
    args,
    options: {
      families: { type: 'string', default: String(smallRun.families) },
      days: { type: 'string', default: String(smallRun.days) },
      seed: { type: 'string', default: smallRun.seed },
      faults: { type: 'string', default: 'on' },
      start: { type: 'string' },
      books: { type: 'string' },
    },
  });
  const whole = (name) => {
    const number = Number(values[name]);
    if (Number.isInteger(number) && number > 0) return number;
    throw new RangeError(`--${name} must be a whole number above 0; it is "${values[name]}".`);
  };
  return {
    families: whole('families'),
    days: whole('days'),
    seed: values.seed,
    faults: values.faults !== 'off',
    ...(values.start && { start: values.start }),
    ...(values.books && { booksFile: values.books }),
  };
}

async function main() {
  const options = optionsOf(process.argv.slice(2));
  const begunAt = Date.now();
  const progress = (day) => {
    const seconds = Math.round((Date.now() - begunAt) / 1000);
    if (day % 10 === 0) say(`  day ${day} of ${options.days}, after ${seconds} s`);
  };
  const { failed, table } = await simulate({ ...options, progress });
  say(table);
  process.exitCode = failed === 0 ? 0 : 1;
}

if (process.argv[1] === fileURLToPath(import.meta.url))
  main().catch((error) => {
    process.stderr.write(`${error.stack}\n`);
    process.exitCode = 1;
  });
