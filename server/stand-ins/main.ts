import { join } from 'node:path';
import { movableClock } from '../clock/clock';
import { readSettings, SettingsError, type Settings } from '../config/settings';
import { connect } from '../database/connection';
import { startStandIns } from './start-stand-ins';

const isLoopback = (url: string): boolean =>
  ['127.0.0.1', 'localhost', '[::1]'].includes(new URL(url).hostname);

function checked(settings: Settings): Settings {
  if (settings.mode === 'production')
    throw new SettingsError(['NODE_ENV: production has no stand-ins']);
  return settings;
}

/** The pretended text and mail services as a process of their own, beside web and sender. */
async function main(): Promise<void> {
  const settings = checked(readSettings(process.env));
  const db = connect(settings.databaseUrl, { poolSize: 2 });
  const clock = movableClock(db);
  const { sms, mail } = settings;
  const standIns = await startStandIns({
    account: { sid: sms.accountSid, token: sms.authToken, from: sms.from },
    origin: () => settings.origin,
    ports: {
      sms: sms.provider === 'stand-in' ? Number(new URL(sms.standInUrl).port) : null,
      mail: isLoopback(mail.url) ? Number(new URL(mail.url).port) : null,
      control: Number(new URL(settings.standInControlUrl).port),
    },
    now: async () => {
      await clock.refresh();
      return clock.now();
    },
    file: join(settings.dataDir, 'stand-ins.jsonl'),
    reportPauseMs: settings.standInReportPauseMs,
  });
  let closing: Promise<void> | undefined;
  const close = () =>
    (closing ??= standIns
      .close()
      .then(() => db.close())
      .then(() => {
        if (process.connected) process.disconnect();
      }));
  process.on('SIGTERM', () => void close());
  process.on('disconnect', () => void close());
  process.send?.({ ready: true });
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exit(error instanceof SettingsError ? 2 : 1);
});
