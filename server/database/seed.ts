import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { readSettings, SettingsError, type Settings } from '../config/settings';
import { openContext } from '../open-context';
import { demoPassword, demoStaff } from './seeds/demo-clinic';
import { seedDemo } from './seeds/demo';

/** Invented people and their sign-offs never get into a clinic that is in use. */
export function refuseDemo(settings: Pick<Settings, 'mode'>): void {
  if (settings.mode === 'production')
    throw new SettingsError([
      'NODE_ENV: production refuses the demo clinic; its people, sign-offs and results are invented',
    ]);
}

/** Who can sign in to the demo clinic, for the start to print. */
export function writeDemoSignIns({ dataDir, origin }: Pick<Settings, 'dataDir' | 'origin'>): void {
  const where = `${origin}/clinic/en/`;
  const signIns = demoStaff.map(({ who, email }) => ({
    who,
    name: email,
    password: demoPassword,
    where,
  }));
  mkdirSync(dataDir, { recursive: true });
  writeFileSync(join(dataDir, 'demo-sign-ins.json'), `${JSON.stringify({ signIns }, null, 2)}\n`, {
    mode: 0o600,
  });
}

async function main(): Promise<void> {
  const settings = readSettings(process.env);
  refuseDemo(settings);
  const context = await openContext(settings, 'seed');
  try {
    const isNew = await seedDemo(context);
    writeDemoSignIns(settings);
    process.stdout.write(isNew ? 'Demo clinic: ready\n' : 'Demo clinic: was there already\n');
  } finally {
    await context.close();
  }
}

if (require.main === module)
  main().catch((error: unknown) => {
    process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    process.exitCode = error instanceof SettingsError ? 2 : 1;
  });
