import { execFileSync } from 'node:child_process';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

interface Family {
  strangePhone: string;
  adults: { phone: string }[];
  mornings: { doing: string }[];
}

const simulation = join(__dirname, '..', 'simulation');
const script = join(simulation, 'script.mjs');

/** The program writes scripts in a process of its own, because it is no part of this compilation. */
function written(families: number, seed: string): Family[] {
  const code = `import { writeScript } from ${JSON.stringify(script)};
    const options = { families: ${families}, seed: ${JSON.stringify(seed)}, clinicDays: [0, 1, 2] };
    process.stdout.write(JSON.stringify(writeScript(options)));`;
  const said = execFileSync(process.execPath, ['--input-type=module', '-e', code], {
    maxBuffer: 1 << 26,
  });
  return JSON.parse(said.toString()) as Family[];
}

describe('the script of a simulation', () => {
  it('is the same for the same seed, and another for another', () => {
    expect(written(20, 'one')).toEqual(written(20, 'one'));
    expect(written(20, 'one')).not.toEqual(written(20, 'two'));
  });

  it('gives every phone a number of its own that is kept for stories', () => {
    const families = written(300, 'numbers');
    const phones = families.flatMap(({ adults, strangePhone }) => [
      strangePhone,
      ...adults.map(({ phone }) => phone),
    ]);
    expect(new Set(phones).size).toBe(phones.length);
    for (const phone of phones) expect(phone).toMatch(/^\+1[2-9]\d{2}55501\d{2}$/);
  });

  it('lets also a few families do everything that families do', () => {
    const doings = new Set(
      written(12, 'small').flatMap(({ mornings }) => mornings.map(({ doing }) => doing)),
    );
    expect([...doings].sort()).toEqual([
      'ate',
      'called-off',
      'changes-mind',
      'digit',
      'forgets',
      'late',
      'not-coming',
      'other-phone',
      'too-early',
      'twice',
      'unclear',
      'unknown-number',
      'web',
    ]);
  });
});

describe('the book-keeper of a simulation', () => {
  const folder = join(simulation, 'book-keeper');

  it.each(readdirSync(folder))('takes nothing from the product: %s', (name) => {
    const code = readFileSync(join(folder, name), 'utf8');
    const imported = [...code.matchAll(/\b(?:from|import|require)\b\s*\(?\s*'([^']+)'/g)];
    for (const [, from] of imported) expect(from).toMatch(/^\.\/[a-z-]+\.mjs$/);
  });
});
