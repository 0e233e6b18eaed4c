import { z } from 'zod';

const onOff = z.enum(['on', 'off']).transform((value) => value === 'on');

const secret = z.string().min(32, 'at least 32 characters');

const environment = z.object({
  NODE_ENV: z.enum(['development', 'test', 'production']).default('development'),
  THREEDAWN_PORT: z.coerce.number().int().min(0).max(65535).default(4300),
  THREEDAWN_HOST: z.string().default('127.0.0.1'),
  THREEDAWN_ORIGIN: z.url().default('http://localhost:4300'),
  THREEDAWN_DATABASE_URL: z.url(),
  THREEDAWN_DATABASE_MIGRATE_URL: z.url().optional(),
  THREEDAWN_SESSION_SECRET: secret,
  THREEDAWN_LINK_SECRET: secret,
  THREEDAWN_SMS_PROVIDER: z.enum(['stand-in', 'twilio']).default('stand-in'),
  THREEDAWN_SMS_STAND_IN_URL: z.url().default('http://127.0.0.1:4310'),
  THREEDAWN_STAND_IN_CONTROL_PORT: z.coerce.number().int().min(0).max(65535).default(4312),
  TWILIO_ACCOUNT_SID: z.string().regex(/^AC[0-9a-f]{32}$/, 'AC and 32 hexadecimal digits'),
  TWILIO_AUTH_TOKEN: z.string().min(16),
  TWILIO_FROM: z.string().regex(/^\+[1-9]\d{6,14}$/, 'a telephone number like +12065550142'),
  THREEDAWN_MAIL_URL: z.url().default('smtp://127.0.0.1:4311'),
  THREEDAWN_MAIL_FROM: z.email().default('visits@clinic.example.org'),
  THREEDAWN_REHEARSAL: onOff.default(false),
  THREEDAWN_CHROMIUM: z.string().default(''),
  THREEDAWN_DATA_DIR: z.string().default('.data'),
  THREEDAWN_DIST_DIR: z.string().default('dist'),
  THREEDAWN_TRUSTED_PROXIES: z.coerce.number().int().min(0).max(5).default(0),
  THREEDAWN_LOG_LEVEL: z
    .enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent'])
    .default('info'),
});

export interface Settings {
  readonly mode: 'development' | 'test' | 'production';
  readonly host: string;
  readonly port: number;
  /** Public address of this installation, without a trailing slash. Signatures of the provider cover it. */
  readonly origin: string;
  readonly databaseUrl: string;
  readonly migrateUrl: string | null;
  readonly sessionSecret: string;
  readonly linkSecret: string;
  readonly sms: {
    readonly provider: 'stand-in' | 'twilio';
    readonly standInUrl: string;
    readonly accountSid: string;
    readonly authToken: string;
    readonly from: string;
  };
  readonly mail: { readonly url: string; readonly from: string };
  readonly rehearsal: boolean;
  /** Where rehearsal asks the stand-ins for their phones and mailboxes; on loopback. */
  readonly standInControlUrl: string;
  /** Path of the browser that prints letters; empty when letters print from HTML. */
  readonly chromium: string;
  readonly dataDir: string;
  readonly distDir: string;
  readonly trustedProxies: number;
  readonly logLevel: 'fatal' | 'error' | 'warn' | 'info' | 'debug' | 'silent';
}

/** The settings cannot be used; each line says which variable and why. */
export class SettingsError extends Error {
  constructor(readonly lines: readonly string[]) {
    super(`The settings cannot be used:\n${lines.map((line) => `  ${line}`).join('\n')}`);
    this.name = 'SettingsError';
  }
}

/** Whether mail would go to this machine itself, where only the stand-in listens. */
const isLoopback = (url: string): boolean =>
  /^(127\.|localhost$|\[::1\]$)/.test(new URL(url).hostname);

const weakSecret = /^(.)\1*$|password|secret|changeme|example/i;

/** What production refuses: stand-ins, rehearsal, weak secrets, plain http. Root is refused where the process starts. */
function productionFaults(settings: Settings): string[] {
  const faults: string[] = [];
  if (settings.sms.provider === 'stand-in')
    faults.push('THREEDAWN_SMS_PROVIDER: production does not send texts to the stand-in');
  if (settings.rehearsal) faults.push('THREEDAWN_REHEARSAL: production has no rehearsal');
  if (isLoopback(settings.mail.url))
    faults.push('THREEDAWN_MAIL_URL: production does not send mail to the stand-in on loopback');
  if (!settings.origin.startsWith('https://'))
    faults.push('THREEDAWN_ORIGIN: production needs an https address');
  for (const [name, value] of [
    ['THREEDAWN_SESSION_SECRET', settings.sessionSecret],
    ['THREEDAWN_LINK_SECRET', settings.linkSecret],
  ] as const)
    if (weakSecret.test(value)) faults.push(`${name}: this secret is easy to guess`);
  if (settings.sessionSecret === settings.linkSecret)
    faults.push('THREEDAWN_LINK_SECRET: must differ from THREEDAWN_SESSION_SECRET');
  return faults;
}

/**
 * Reads and checks the environment once, at start.
 * @throws SettingsError with one line for every variable that is wrong.
 */
export function readSettings(source: NodeJS.ProcessEnv): Settings {
  const parsed = environment.safeParse(source);
  if (!parsed.success)
    throw new SettingsError(
      parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`),
    );
  const values = parsed.data;
  const settings: Settings = {
    mode: values.NODE_ENV,
    host: values.THREEDAWN_HOST,
    port: values.THREEDAWN_PORT,
    origin: values.THREEDAWN_ORIGIN.replace(/\/$/, ''),
    databaseUrl: values.THREEDAWN_DATABASE_URL,
    migrateUrl: values.THREEDAWN_DATABASE_MIGRATE_URL ?? null,
    sessionSecret: values.THREEDAWN_SESSION_SECRET,
    linkSecret: values.THREEDAWN_LINK_SECRET,
    sms: {
      provider: values.THREEDAWN_SMS_PROVIDER,
      standInUrl: values.THREEDAWN_SMS_STAND_IN_URL.replace(/\/$/, ''),
      accountSid: values.TWILIO_ACCOUNT_SID,
      authToken: values.TWILIO_AUTH_TOKEN,
      from: values.TWILIO_FROM,
    },
    mail: { url: values.THREEDAWN_MAIL_URL, from: values.THREEDAWN_MAIL_FROM },
    rehearsal: values.THREEDAWN_REHEARSAL,
    standInControlUrl: `http://127.0.0.1:${values.THREEDAWN_STAND_IN_CONTROL_PORT}`,
    chromium: values.THREEDAWN_CHROMIUM,
    dataDir: values.THREEDAWN_DATA_DIR,
    distDir: values.THREEDAWN_DIST_DIR,
    trustedProxies: values.THREEDAWN_TRUSTED_PROXIES,
    logLevel: values.THREEDAWN_LOG_LEVEL,
  };
  if (settings.rehearsal && settings.sms.provider !== 'stand-in')
    throw new SettingsError([
      'THREEDAWN_REHEARSAL: rehearsal works with the stand-ins only, and THREEDAWN_SMS_PROVIDER is a real service',
    ]);
  if (settings.rehearsal && !isLoopback(settings.mail.url))
    throw new SettingsError([
      'THREEDAWN_REHEARSAL: rehearsal works with the stand-ins only, and THREEDAWN_MAIL_URL is a real service',
    ]);
  if (settings.mode === 'production') {
    const faults = productionFaults(settings);
    if (faults.length > 0) throw new SettingsError(faults);
  }
  return settings;
}
