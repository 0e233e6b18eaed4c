// `npm run bench`: every test/bench/*.bench.mjs, and one table of ratios. `npm run bench -- web` runs
// one of them by its file name.
//
// Nothing here is a timed test: a machine that is busy is slow for both sides of a ratio, so each
// bench measures the thing and what it is compared with in the same run, in turns.
//
// To add one: a file test/bench/<matter>.bench.mjs that exports
//   name   what the table calls it
//   run()  answers its rows, or a promise of them; each row is
//          { what, value, of, ratio, limit? }
//            what   the thing that was measured, in words
//            value  what came out, with its unit, ready to print
//            of     what it is compared with, with its unit, ready to print
//            ratio  value divided by of, as a number
//            limit  the largest ratio that is still good; left out where the row is for reading only
// A ratio above its limit, or a bench that fails, makes the end status 1. What a bench needs built it
// builds itself (the server is compiled already). Helpers of benches live in test/bench/support.
import { readdirSync } from 'node:fs';
import { pathToFileURL } from 'node:url';
import { inRoot } from '../../server/bootstrap/folders.mjs';
import { say } from '../../server/bootstrap/say.mjs';
import { tableOf } from './support/table.mjs';

const ending = '.bench.mjs';

async function runAll(chosen) {
  const known = readdirSync(inRoot('test/bench'))
    .filter((file) => file.endsWith(ending))
    .map((file) => file.slice(0, -ending.length))
    .sort();
  const unknown = chosen.filter((name) => !known.includes(name));
  if (unknown.length > 0)
    throw new Error(`No bench is named ${unknown.join(', ')}. There are: ${known.join(', ')}.`);
  const done = [];
  const failures = [];
  for (const file of chosen.length > 0 ? chosen : known) {
    const bench = await import(pathToFileURL(inRoot('test/bench', `${file}${ending}`)).href);
    say(`  ${bench.name} ...`);
    try {
      done.push({ name: bench.name, rows: await bench.run() });
    } catch (error) {
      failures.push(`${bench.name}: ${error.stack}`);
    }
  }
  say(`\n${tableOf(done)}`);
  for (const failure of failures) say(failure);
  const isOver = ({ ratio, limit }) => limit !== undefined && !(ratio <= limit);
  return failures.length === 0 && !done.some(({ rows }) => rows.some(isOver));
}

process.exitCode = (await runAll(process.argv.slice(2))) ? 0 : 1;
