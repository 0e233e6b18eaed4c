import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { migratedTestDatabase } from '../support/database';
import { startProgram } from '../support/program';
import { testSettings } from '../support/server';

jest.setTimeout(60_000);

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'threedawn-stand-ins-'));
});
afterEach(() => rmSync(folder, { recursive: true }));

async function freePort(): Promise<number> {
  const server = createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo;
  await new Promise((resolve) => server.close(resolve));
  return port;
}

async function environment(): Promise<Record<string, string>> {
  const { url } = await migratedTestDatabase();
  const settings = testSettings(url);
  return {
    NODE_ENV: 'test',
    THREEDAWN_ORIGIN: settings.origin,
    THREEDAWN_DATABASE_URL: url,
    THREEDAWN_SESSION_SECRET: settings.sessionSecret,
    THREEDAWN_LINK_SECRET: settings.linkSecret,
    THREEDAWN_SMS_STAND_IN_URL: `http://127.0.0.1:${await freePort()}`,
    THREEDAWN_MAIL_URL: `smtp://127.0.0.1:${await freePort()}`,
    THREEDAWN_STAND_IN_CONTROL_PORT: String(await freePort()),
    THREEDAWN_DATA_DIR: folder,
    TWILIO_ACCOUNT_SID: settings.sms.accountSid,
    TWILIO_AUTH_TOKEN: settings.sms.authToken,
    TWILIO_FROM: settings.sms.from,
  };
}

it('starts, answers on loopback and ends cleanly when told to', async () => {
  const own = await environment();
  const program = await startProgram('server/stand-ins/main.ts', own);
  const state = await fetch(`http://127.0.0.1:${own['THREEDAWN_STAND_IN_CONTROL_PORT']}/state`);
  expect(await state.json()).toEqual({ texts: [], mails: [], optedOut: [] });
  program.process.kill('SIGTERM');
  expect(await program.ended).toBe(0);
  expect(program.complaints()).toBe('');
});

it('refuses to run in production, in words', async () => {
  const own = {
    ...(await environment()),
    NODE_ENV: 'production',
    THREEDAWN_SMS_PROVIDER: 'twilio',
    THREEDAWN_ORIGIN: 'https://clinic.example.org',
    THREEDAWN_MAIL_URL: 'smtp://mail.example.org:587',
  };
  await expect(startProgram('server/stand-ins/main.ts', own)).rejects.toThrow(
    /ended with 2: [^]*production has no stand-ins/,
  );
});
