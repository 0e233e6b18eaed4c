import { accountNames, databaseUrl } from '../database/local-server/accounts.mjs';
import { PlainFailure } from './say.mjs';

export const schema = 'threedawn';

const standardPorts = { web: 4300, sms: 4310, mail: 4311, control: 4312, database: 4316 };

/** What the person set, as far as starting depends on it. The programs check every value themselves. */
export function chosenSettings(environment = process.env) {
  const production = environment.NODE_ENV === 'production';
  const ownDatabase = Boolean(environment.THREEDAWN_DATABASE_URL);
  const smsProvider = environment.THREEDAWN_SMS_PROVIDER || (production ? 'twilio' : 'stand-in');
  const ownMail = Boolean(environment.THREEDAWN_MAIL_URL);
  return {
    production,
    ownDatabase,
    smsProvider,
    ownMail,
    host: environment.THREEDAWN_HOST || '127.0.0.1',
    rehearsal: environment.THREEDAWN_REHEARSAL || (production ? 'off' : 'on'),
    standIns: !production && (smsProvider === 'stand-in' || !ownMail),
    ports: {
      web: portFrom(environment, 'THREEDAWN_PORT', standardPorts.web),
      sms: portOfUrl(environment.THREEDAWN_SMS_STAND_IN_URL) ?? standardPorts.sms,
      mail: standardPorts.mail,
      control: portFrom(environment, 'THREEDAWN_STAND_IN_CONTROL_PORT', standardPorts.control),
      database: portFrom(environment, 'THREEDAWN_PRIVATE_DATABASE_PORT', standardPorts.database),
    },
  };
}

function portFrom(environment, name, standard) {
  const text = environment[name];
  if (text === undefined || text === '') return standard;
  const port = Number(text);
  if (Number.isInteger(port) && port >= 1 && port <= 65_535) return port;
  throw new PlainFailure(`${name} must be a port number from 1 to 65535; it is "${text}".`);
}

function portOfUrl(url) {
  if (!url) return undefined;
  try {
    return Number(new URL(url).port) || undefined;
  } catch {
    throw new PlainFailure(`THREEDAWN_SMS_STAND_IN_URL is no address: "${url}".`);
  }
}

/**
 * The whole environment of the programs: what the person set wins, the rest is filled in. In
 * production nothing pretended is filled in, so that the programs can refuse what is missing.
 */
export function programEnvironment({
  settings,
  ports,
  secrets,
  dataDirectory,
  chromium,
  databasePort,
  environment = process.env,
}) {
  const pretend = settings.production
    ? {}
    : {
        THREEDAWN_SMS_STAND_IN_URL: `http://127.0.0.1:${ports.sms}`,
        THREEDAWN_MAIL_URL: `smtp://127.0.0.1:${ports.mail}`,
        THREEDAWN_STAND_IN_CONTROL_PORT: String(ports.control),
        ...(settings.smsProvider === 'stand-in'
          ? {
              TWILIO_ACCOUNT_SID: secrets.smsAccount,
              TWILIO_AUTH_TOKEN: secrets.smsToken,
              TWILIO_FROM: '+12065550100',
            }
          : {}),
      };
  const database = settings.ownDatabase
    ? {}
    : {
        THREEDAWN_DATABASE_URL: databaseUrl({
          account: accountNames.app,
          password: secrets.databaseApp,
          port: databasePort,
          schema,
        }),
        THREEDAWN_DATABASE_MIGRATE_URL: databaseUrl({
          account: accountNames.migrate,
          password: secrets.databaseMigrate,
          port: databasePort,
          schema,
        }),
      };
  const standard = {
    NODE_ENV: 'development',
    THREEDAWN_PORT: String(ports.web),
    THREEDAWN_ORIGIN: `http://localhost:${ports.web}`,
    THREEDAWN_SESSION_SECRET: secrets.sessionSecret,
    THREEDAWN_LINK_SECRET: secrets.linkSecret,
    THREEDAWN_SMS_PROVIDER: settings.smsProvider,
    THREEDAWN_REHEARSAL: settings.rehearsal,
    THREEDAWN_CHROMIUM: chromium,
    THREEDAWN_DATA_DIR: dataDirectory,
    THREEDAWN_LOG_LEVEL: 'info',
    ...pretend,
    ...database,
  };
  const set = Object.entries(environment).filter(([, value]) => value !== '');
  return { ...standard, ...Object.fromEntries(set) };
}

/** The environment of a long-running program: without the account that may change tables. */
export function withoutMigrateAccount(environment) {
  const { THREEDAWN_DATABASE_MIGRATE_URL: _left, ...rest } = environment;
  return rest;
}
