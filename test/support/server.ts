import { createHmac, randomBytes } from 'node:crypto';
import { hash } from '@node-rs/argon2';
import type { Express } from 'express';
import pino from 'pino';
import request from 'supertest';
import type { StaffRole } from '../../shared/access/rights';
import { buildApp } from '../../server/app';
import { familyCookie } from '../../server/auth/sessions';
import { hashToken } from '../../server/auth/token-hash';
import { readSettings } from '../../server/config/settings';
import type { Settings } from '../../server/config/settings';
import type { Context } from '../../server/context';
import { connect, select } from '../../server/database/connection';
import { initModels } from '../../server/database/models';
import type { Printer } from '../../server/printing/printer';
import { migratedTestDatabase } from './database';
import type { MigratedTestDatabase } from './database';
import { insert } from './insert';

export type Agent = ReturnType<typeof request.agent>;

export const staffPassword = 'a long and quiet morning';

export interface TestServer {
  readonly context: Context;
  readonly app: Express;
  readonly database: MigratedTestDatabase;
  /** Moves the business clock to an instant, or back to the real one. */
  setNow(now: number | null): void;
  /** An agent that keeps cookies and comes from our own pages. */
  visitor(): Agent;
  /** A staff member with these roles; the password is `staffPassword`. */
  addStaff(
    roles: readonly StaffRole[],
    more?: { email?: string; fullName?: string },
  ): Promise<{ id: number; email: string }>;
  /** Signs a new staff member with the role in, through the sign-in itself. */
  signInStaff(role: StaffRole | readonly StaffRole[]): Promise<Agent>;
  /** A signed-in family member; 'fresh' as after a code, for 15 minutes. */
  openFamilySession(familyMemberId: number, reach: 'household' | 'fresh'): Promise<Agent>;
  /** The first site, made when there is none. */
  siteId(): Promise<number>;
  close(): Promise<void>;
}

export interface TestServerOptions {
  readonly settings?: Partial<Settings>;
  readonly printer?: Printer;
  /** Connections to the database; few of them show who waits for a second one while holding the first. */
  readonly poolSize?: number;
}

const printerOfTests: Printer = {
  print: (html) => Promise.resolve(Buffer.from(`%PDF-1.7 ${html.length}`)),
  close: () => Promise.resolve(),
};

export function testSettings(databaseUrl: string, more: Partial<Settings> = {}): Settings {
  const settings = readSettings({
    NODE_ENV: 'test',
    THREEDAWN_ORIGIN: 'http://localhost:4300',
    THREEDAWN_DATABASE_URL: databaseUrl,
    THREEDAWN_SESSION_SECRET: 'session-'.repeat(5),
    THREEDAWN_LINK_SECRET: 'of-links-'.repeat(5),
    TWILIO_ACCOUNT_SID: `AC${'0'.repeat(32)}`,
    TWILIO_AUTH_TOKEN: '1'.repeat(32),
    TWILIO_FROM: '+12065550100',
    THREEDAWN_LOG_LEVEL: 'silent',
    THREEDAWN_DIST_DIR: '/nonexistent/dist',
  });
  return { ...settings, ...more };
}

/** The whole application in this process on this worker's own, emptied schema. Close it in afterAll. */
export async function startTestServer(options: TestServerOptions = {}): Promise<TestServer> {
  const database = await migratedTestDatabase();
  const settings = testSettings(database.url, options.settings);
  const db = connect(database.url, { poolSize: options.poolSize ?? 8 });
  initModels(db);
  let moved: number | null = null;
  const context: Context = {
    settings,
    db,
    clock: { now: () => moved ?? Date.now(), refresh: () => Promise.resolve() },
    log: pino({ level: settings.logLevel }),
    printer: options.printer ?? printerOfTests,
  };
  const app = buildApp(context);

  const visitor = (): Agent => {
    const agent = request.agent(app);
    agent.set('Sec-Fetch-Site', 'same-origin');
    return agent;
  };
  const siteId = async (): Promise<number> => {
    const [row] = await select<{ id: number | null }>(db, 'SELECT MIN(id) AS id FROM sites');
    return row?.id ?? insert(db, 'sites', siteOfTests);
  };
  const addStaff: TestServer['addStaff'] = async (roles, more = {}) => {
    await siteId();
    const email =
      more.email ?? `${roles[0] ?? 'nobody'}-${randomBytes(4).toString('hex')}@example.org`;
    const id = await insert(db, 'staff', {
      full_name: more.fullName ?? `Test ${roles.join(' ')}`,
      email,
      // The cheapest cost: what is tried here is the sign-in, not the hash.
      password_hash: await hash(staffPassword, { memoryCost: 8, timeCost: 1, parallelism: 1 }),
      is_active: true,
      created_at: new Date(),
    });
    for (const role of roles) await insert(db, 'staff_roles', { staff_id: id, role });
    return { id, email };
  };

  return {
    context,
    app,
    database,
    visitor,
    siteId,
    addStaff,
    setNow: (now) => {
      moved = now;
    },
    signInStaff: async (role) => {
      const { email } = await addStaff(typeof role === 'string' ? [role] : role);
      const agent = visitor();
      await agent.post('/api/clinic/session').send({ email, password: staffPassword }).expect(200);
      return agent;
    },
    openFamilySession: async (familyMemberId, reach) => {
      const id = randomBytes(24).toString('base64url');
      const now = Date.now();
      await insert(db, 'sessions', {
        id_hash: hashToken(id),
        side: 'family',
        subject_id: familyMemberId,
        data: JSON.stringify({
          cookie: { path: familyCookie.path, httpOnly: true, originalMaxAge: null, expires: null },
          family: {
            familyMemberId,
            isRemembered: false,
            freshUntil: reach === 'fresh' ? now + 15 * 60_000 : null,
          },
        }),
        created_at: new Date(now),
        seen_at: new Date(now),
        expires_at: new Date(now + 3_600_000),
      });
      const agent = visitor();
      agent.set('Cookie', `${familyCookie.name}=${signedCookie(id, settings.sessionSecret)}`);
      return agent;
    },
    close: async () => {
      await db.close();
    },
  };
}

/** The cookie as express-session writes it: `s:` id `.` HMAC-SHA256 in base64 without padding. */
export function signedCookie(id: string, secret: string): string {
  const signature = createHmac('sha256', secret).update(id).digest('base64').replace(/=+$/, '');
  return encodeURIComponent(`s:${id}.${signature}`);
}

const siteOfTests = {
  name: 'Harbor Children’s Clinic',
  short_name: 'Harbor Clinic',
  zone: 'America/Los_Angeles',
  country: 'US',
  region: 'WA',
  address: '12 Quay Street',
  door: 'Door B',
  door_directions: 'The blue door beside the garden.',
  phone: '+12065550110',
  emergency_number: '911',
  dawn_answers_from_time: '04:30',
  dawn_answers_until_time: '08:00',
  clinic_weekdays: '[1,2,3,4,5]',
  arrivals_from_time: '06:00',
  arrivals_until_time: '08:00',
  minutes_per_child: 45,
  places_per_morning: 4,
  staff_pairs: 1,
  lead_days: 2,
  usual_wait_minutes: 20,
  evening_text_time: '18:00',
  morning_question_minutes_before: 90,
  call_list_minutes_before: 60,
};
