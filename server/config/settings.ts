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
  THREEDAWN_STAND_IN_REPORT_PAUSE_MS: z.coerce.number().int().min(0).max(60_000).default(300),
  TWILIO_ACCOUNT_SID: z.string().regex(/^AC[0-9a-f]{32}$/, 'AC and 32 hexadecimal digits'),
  TWILIO_AUTH_TOKEN: z.string().min(16),
  TWILIO_FROM: z.string().regex(/^\+[1-9]\d{6,14}$/, 'a telephone number like +12065550142'),
  THREEDAWN_MAIL_URL: z.url().default('smtp://127.0.0.1:4311'),
  THREEDAWN_MAIL_FROM: z.email().default('visits@clinic.example.org'),
  THREEDAWN_MAIL_DOMAIN: z.hostname().optional(),
  THREEDAWN_HEARTBEAT_URL: z.url().optional(),
  THREEDAWN_HEARTBEAT_EVERY_MINUTES: z.coerce.number().min(1).max(60).default(5),
  THREEDAWN_TEXTS_PER_SECOND: z.coerce.number().min(0.1).max(500).default(10),
  THREEDAWN_MAILS_PER_SECOND: z.coerce.number().min(0.1).max(500).default(10),
  THREEDAWN_PROVIDER_ANSWERS_WITHIN_SECONDS: z.coerce.number().min(1).max(60).default(15),
  THREEDAWN_SENDER_CLAIM_SECONDS: z.coerce.number().min(5).max(600).default(60),
  THREEDAWN_SENDER_LOOKS_EVERY_MS: z.coerce.number().int().min(20).max(5_000).default(400),
  THREEDAWN_CALL_LIST_EVERY_MS: z.coerce.number().int().min(100).max(60_000).default(5_000),
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
  readonly mail: {
    readonly url: string;
    readonly from: string;
    /** For which SPF, DKIM and DMARC stand in the DNS; null takes the one of the public address. */
    readonly domain: string | null;
  };
  /** Asked while messages go out, so that somebody outside notices when they do not; null for none. */
  readonly heartbeat: { readonly url: string; readonly everyMs: number } | null;
  readonly sender: {
    /** What each provider's contract allows. */
    readonly perSecond: { readonly sms: number; readonly mail: number };
    /** A provider that is silent for longer has not said what became of a message. */
    readonly answersWithinMs: number;
    /** How long a claim lasts by the real clock. */
    readonly claimLastsMs: number;
    /** Pause between two looks into an outbox where nothing is due. */
    readonly looksEveryMs: number;
    /** How often families without an answer are looked for. */
    readonly callListEveryMs: number;
  };
  readonly rehearsal: boolean;
  /** Where rehearsal asks the stand-ins for their phones and mailboxes; on loopback. */
  readonly standInControlUrl: string;
  /** Pause of the pretended text service before each delivery report. */
  readonly standInReportPauseMs: number;
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

/**
 * DMARC wants the domain that readers see to be the one that SPF or DKIM vouch for (RFC 7489, 3.1), so it is named on
 * purpose: the domain of the public address, one above it, or the one that was set.
 */
function isFromOwnDomain({ mail, origin }: Settings): boolean {
  const from = mail.from.slice(mail.from.lastIndexOf('@') + 1).toLowerCase();
  if (mail.domain !== null) return from === mail.domain;
  const host = new URL(origin).hostname;
  return from.includes('.') && (host === from || host.endsWith(`.${from}`));
}

function heartbeatFaults({ heartbeat, mode }: Settings): string[] {
  if (heartbeat === null) return [];
  const { protocol, username, password } = new URL(heartbeat.url);
  if (username !== '' || password !== '')
    return ['THREEDAWN_HEARTBEAT_URL: an address with a user or a password is not asked'];
  if (protocol === 'https:') return [];
  // The stand-in of a test, on this machine.
  if (protocol === 'http:' && isLoopback(heartbeat.url) && mode !== 'production') return [];
  return ['THREEDAWN_HEARTBEAT_URL: begins with https://'];
}

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
  if (!isFromOwnDomain(settings))
    faults.push(
      'THREEDAWN_MAIL_FROM: the domain of the sender is neither that of THREEDAWN_ORIGIN nor THREEDAWN_MAIL_DOMAIN; such mail is taken for forged',
    );
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
    mail: {
      url: values.THREEDAWN_MAIL_URL,
      from: values.THREEDAWN_MAIL_FROM,
      domain: values.THREEDAWN_MAIL_DOMAIN?.toLowerCase() ?? null,
    },
    heartbeat:
      values.THREEDAWN_HEARTBEAT_URL === undefined
        ? null
        : {
            url: values.THREEDAWN_HEARTBEAT_URL,
            everyMs: values.THREEDAWN_HEARTBEAT_EVERY_MINUTES * 60_000,
          },
    sender: {
      perSecond: {
        sms: values.THREEDAWN_TEXTS_PER_SECOND,
        mail: values.THREEDAWN_MAILS_PER_SECOND,
      },
      answersWithinMs: values.THREEDAWN_PROVIDER_ANSWERS_WITHIN_SECONDS * 1000,
      claimLastsMs: values.THREEDAWN_SENDER_CLAIM_SECONDS * 1000,
      looksEveryMs: values.THREEDAWN_SENDER_LOOKS_EVERY_MS,
      callListEveryMs: values.THREEDAWN_CALL_LIST_EVERY_MS,
    },
    rehearsal: values.THREEDAWN_REHEARSAL,
    standInControlUrl: `http://127.0.0.1:${values.THREEDAWN_STAND_IN_CONTROL_PORT}`,
    standInReportPauseMs: values.THREEDAWN_STAND_IN_REPORT_PAUSE_MS,
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
  // Another sender would take over what the provider is still thinking about, and send it twice.
  if (settings.sender.claimLastsMs < 3 * settings.sender.answersWithinMs)
    throw new SettingsError([
      'THREEDAWN_SENDER_CLAIM_SECONDS: at least three times THREEDAWN_PROVIDER_ANSWERS_WITHIN_SECONDS',
    ]);
  const beating = heartbeatFaults(settings);
  if (beating.length > 0) throw new SettingsError(beating);
  if (settings.mode === 'production') {
    const faults = productionFaults(settings);
    if (faults.length > 0) throw new SettingsError(faults);
  }
  return settings;
}
