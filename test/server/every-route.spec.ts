import request from 'supertest';
import { can, rightsOf, staffRoles } from '../../shared/access/rights';
import { mounts } from '../../server/app';
import { mountedRoutes } from '../../server/http/ladders';
import type { MountedRoute } from '../../server/http/ladders';
import { startTestServer } from '../support/server';
import type { Agent, TestServer } from '../support/server';

let server: TestServer;
let routes: Route[];

type Route = MountedRoute & { readonly method: 'get' | 'post' | 'put' | 'patch' | 'delete' };

/** An id that nobody has: a guard that lets somebody pass ends in "not found", never in a row. */
const withUnknownIds = (path: string): string => path.replace(/:[A-Za-z]+/g, '999999999');

function everyRoute(): Route[] {
  const routers = mounts
    .filter(({ under }) => under.startsWith('/api'))
    .map(({ under, routes: make }) => ({ under, router: make(server.context) }));
  return mountedRoutes(routers).map((route) => ({
    ...(route as Route),
    path: withUnknownIds(route.path),
  }));
}

const ask = (agent: Agent, { method, path }: Route) =>
  agent[method](path).set('Sec-Fetch-Site', 'same-origin');

beforeAll(async () => {
  server = await startTestServer();
  routes = everyRoute();
});
afterAll(() => server.close());

/** Open by design: the way in, and the way out. */
const openClinic = [
  'post /api/clinic/session',
  'delete /api/clinic/session',
  'post /api/clinic/staff-invitations/accept',
];
/** Signed in is enough: who am I, and topics without content. */
const anyStaff = [
  'get /api/clinic/session',
  'get /api/clinic/live',
  'get /api/clinic/openapi.json',
];
const openFamily = [
  'post /api/family/links/describe',
  'post /api/family/links/open',
  'delete /api/family/session',
  'post /api/family/session/sign-out',
  'post /api/family/session/forget',
  'post /api/family/phone/forget',
  'post /api/family/codes',
  'post /api/family/codes/check',
];
const nameOf = ({ method, path }: Route): string => `${method} ${path}`;

it('finds the routes', () => {
  expect(routes.length).toBeGreaterThan(20);
});

it('every clinic route names a right, but for the few that are open on purpose', () => {
  const bare = routes
    .filter(({ path, right }) => path.startsWith('/api/clinic') && right === undefined)
    .map(nameOf)
    .filter((name) => !openClinic.includes(name) && !anyStaff.includes(name));
  expect(bare).toEqual([]);
});

it('every family route names a reach, but for the few that are open on purpose', () => {
  const bare = routes
    .filter(({ path, reach }) => path.startsWith('/api/family') && reach === undefined)
    .map(nameOf)
    .filter((name) => !openFamily.includes(name));
  expect(bare).toEqual([]);
});

it('nobody passes without a session', async () => {
  const wrong: string[] = [];
  for (const route of routes) {
    const name = nameOf(route);
    if (openClinic.includes(name) || openFamily.includes(name)) continue;
    const answer = await ask(request.agent(server.app), route);
    if (answer.status !== 401) wrong.push(`${name}: ${answer.status}`);
  }
  expect(wrong).toEqual([]);
});

it('no write passes from another site, with or without a session', async () => {
  const agent = await server.signInStaff('clinician');
  const wrong: string[] = [];
  for (const route of routes.filter(({ method }) => method !== 'get')) {
    const answer = await agent[route.method](route.path).set('Sec-Fetch-Site', 'cross-site');
    if (answer.status !== 403 || (answer.body as { code?: string }).code !== 'cross-origin')
      wrong.push(`${nameOf(route)}: ${answer.status}`);
  }
  expect(wrong).toEqual([]);
});

it.each(staffRoles)('%s passes exactly where the table grants it', async (role) => {
  const agent = await server.signInStaff(role);
  const wrong: string[] = [];
  for (const route of routes) {
    if (route.right === undefined) continue;
    const answer = await ask(agent, route);
    const isRefused = (answer.body as { code?: string }).code === 'not-allowed';
    if (isRefused === can([role], route.right)) wrong.push(`${nameOf(route)}: ${answer.status}`);
    if (answer.status >= 500 && answer.status !== 503)
      wrong.push(`${nameOf(route)}: ${answer.status}`);
  }
  expect(wrong).toEqual([]);
  expect(rightsOf([role]).length).toBeGreaterThan(0);
});

it('is described from the same schemas, for signed-in staff', async () => {
  await server.visitor().get('/api/clinic/openapi.json').expect(401);
  const agent = await server.signInStaff('administrator');
  const { body } = await agent.get('/api/clinic/openapi.json').expect(200);
  const { paths, openapi } = body as {
    openapi: string;
    paths: Record<string, Record<string, { 'x-right'?: string; requestBody?: unknown }>>;
  };
  expect(openapi).toBe('3.1.0');
  expect(paths['/api/clinic/people']?.['post']).toMatchObject({
    'x-right': 'people.write',
    requestBody: {
      content: { 'application/json': { schema: { required: ['fullName', 'email', 'roles'] } } },
    },
  });
  const described = Object.values(paths).flatMap((one) => Object.keys(one));
  expect(described).toHaveLength(routes.length + mountedHooks());
});

function mountedHooks(): number {
  const hooks = mounts.filter(({ under }) => !under.startsWith('/api'));
  return mountedRoutes(
    hooks.map(({ under, routes: make }) => ({ under, router: make(server.context) })),
  ).length;
}
