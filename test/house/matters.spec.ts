import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

const root = join(__dirname, '../..');
const sources = readdirSync(join(root, 'server'), { recursive: true, encoding: 'utf8' })
  .filter((file) => file.endsWith('.ts') && !file.endsWith('.spec.ts'))
  .map((file) => readFileSync(join(root, 'server', file), 'utf8'));

it('has words in the access record for every matter that the server records', () => {
  const recorded = new Set(
    sources.flatMap((text) =>
      [...text.matchAll(/\bmatter: '([a-z-]+)'/g)].flatMap(([, matter]) => matter ?? []),
    ),
  );
  const words = readFileSync(join(root, 'src/clinic/app/access-record/matter-words.ts'), 'utf8');
  const told = new Set(
    [...words.matchAll(/^ {2}'?([a-z-]+)'?: \$localize/gm)].flatMap(([, matter]) => matter ?? []),
  );
  expect(recorded.size).toBeGreaterThan(40);
  expect([...recorded].filter((matter) => !told.has(matter))).toEqual([]);
});
