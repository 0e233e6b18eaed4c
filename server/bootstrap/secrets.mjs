import { randomBytes } from 'node:crypto';
import { chmodSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { PlainFailure } from './say.mjs';

const names = ['sessionSecret', 'linkSecret', 'databaseApp', 'databaseMigrate', 'smsToken'];

/**
 * The random secrets of a data folder, made at the first start and kept: links and sessions that
 * exist stay valid. The file can be read by its owner alone.
 */
export function secretsOf(dataDirectory) {
  const file = join(dataDirectory, 'secrets.json');
  const kept = read(file);
  const secrets = Object.fromEntries(
    names.map((name) => [name, kept[name] ?? randomBytes(32).toString('hex')]),
  );
  // Shaped like the provider's account name, which its SDK checks: AC and 32 hexadecimal digits.
  secrets.smsAccount = kept.smsAccount ?? `AC${randomBytes(16).toString('hex')}`;
  if (Object.entries(secrets).some(([name, value]) => kept[name] !== value)) write(file, secrets);
  else chmodSync(file, 0o600);
  return secrets;
}

function read(file) {
  let text;
  try {
    text = readFileSync(file, 'utf8');
  } catch (error) {
    if (error.code === 'ENOENT') return {};
    throw error;
  }
  try {
    return JSON.parse(text);
  } catch {
    throw new PlainFailure(
      `${file} is damaged. Put back a copy of it, or remove it: links and sessions that exist then end.`,
    );
  }
}

function write(file, secrets) {
  mkdirSync(dirname(file), { recursive: true });
  writeFileSync(`${file}.tmp`, `${JSON.stringify(secrets, null, 2)}\n`, { mode: 0o600 });
  renameSync(`${file}.tmp`, file);
}
