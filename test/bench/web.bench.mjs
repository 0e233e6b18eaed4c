// What the first pages cost on an old phone, beside a bare page of the same framework in the same browser.
/* global navigator -- of the page */
import { buildAll } from '../../server/bootstrap/build.mjs';
import { openThrowawayHouse } from '../../server/bootstrap/house.mjs';
import { barePages, buildBarePages } from './support/bare-pages.mjs';
import { newPhone, openBrowser, scriptMeter, visit } from './support/old-phone.mjs';
import { familyCookies, staffCookies } from './support/people.mjs';
import { serveFolder } from './support/static-server.mjs';
import { medianOf } from './support/table.mjs';

export const name = 'Web: script and largest paint (phone: CPU 4 times slower, 1.6 Mbit/s, 150 ms)';

const rounds = 5;
const parent = '+13125550111';
const nightPath = 'td-night-path';
const limits = { firstVisit: 1.3, withoutSignal: 0.6, familyKb: 95, clinicKb: 210 };

export async function run() {
  await buildAll();
  const folders = await buildBarePages();
  const house = await openThrowawayHouse();
  const servers = await Promise.all(barePages.map((page) => serveFolder(folders[page])));
  const browser = await openBrowser();
  try {
    const measured = await measure(browser, house, servers);
    return rowsOf(measured, await clinicScriptBytes(browser, house));
  } finally {
    await browser.close();
    await Promise.all(servers.map((server) => server.close()));
    await house.close();
  }
}

/** In turns, so that what else the machine does falls on all of them alike. */
async function measure(browser, house, [bare, withRouter]) {
  const home = `${house.origin}/en/`;
  const cookies = await familyCookies(house, parent);
  const known = await phoneThatWasHere(browser, home, cookies);
  const visits = { bare: [], withRouter: [], family: [], withoutSignal: [] };
  for (let round = 0; round < rounds; round += 1) {
    visits.bare.push(await firstVisit(browser, bare.origin, 'h1'));
    visits.withRouter.push(await firstVisit(browser, withRouter.origin, 'h1:not(:empty)'));
    visits.family.push(await firstVisit(browser, home, nightPath, cookies));
    visits.withoutSignal.push(await visit(known, home, nightPath, { hasSignal: false }));
  }
  await known.close();
  return Object.fromEntries(
    Object.entries(visits).map(([key, values]) => [
      key,
      {
        paint: medianOf(values.map(({ largestPaintMs }) => largestPaintMs)),
        script: medianOf(values.map(({ scriptBytes }) => scriptBytes)),
      },
    ]),
  );
}

async function firstVisit(browser, address, until, cookies) {
  const phone = await newPhone(browser, { cookies });
  try {
    return await visit(phone, address, until);
  } finally {
    await phone.close();
  }
}

/** A phone on which the page was opened before, with its worker at work, and no signal any more. */
async function phoneThatWasHere(browser, home, cookies) {
  const phone = await newPhone(browser, { cookies, remembers: true });
  const page = await phone.newPage();
  await page.goto(home);
  await page.locator(nightPath).waitFor();
  await page.evaluate(() => navigator.serviceWorker.ready.then(() => undefined));
  // From here on every page of this phone comes through the worker.
  await page.reload();
  await page.waitForFunction(() => navigator.serviceWorker.controller !== null);
  await page.locator(nightPath).waitFor();
  await page.waitForLoadState('networkidle');
  await page.close();
  await phone.setOffline(true);
  return phone;
}

/** The sign-in, and the first screen behind it. */
async function clinicScriptBytes(browser, house) {
  const context = await browser.newContext();
  const page = await context.newPage();
  const scripts = scriptMeter(page);
  await page.goto(`${house.origin}/clinic/en/sign-in`);
  await page.locator('h1').waitFor();
  await context.addCookies(await staffCookies(house, 'rosa@alder.example.org'));
  await page.goto(`${house.origin}/clinic/en/this-morning`);
  await page.locator('td-this-morning h1').waitFor();
  const bytes = await scripts.bytes();
  await context.close();
  return bytes;
}

function rowsOf({ bare, withRouter, family, withoutSignal }, clinicBytes) {
  const kb = (bytes) => `${(bytes / 1000).toFixed(1)} kB`;
  const ms = (value) => `${Math.round(value)} ms`;
  const paint = (what, one, other, limit) => ({
    what,
    value: ms(one.paint),
    of: `${ms(other.paint)}, bare with router`,
    ratio: one.paint / other.paint,
    limit,
  });
  const budget = (what, bytes, kilobytes) => ({
    what,
    value: kb(bytes),
    of: `${kilobytes} kB, its budget`,
    ratio: bytes / 1000 / kilobytes,
    limit: 1,
  });
  const script = (what, bytes, other, title) => ({
    what,
    value: kb(bytes),
    of: `${kb(other.script)}, ${title}`,
    ratio: bytes / other.script,
  });
  return [
    paint('Night path, first visit: largest paint', family, withRouter, limits.firstVisit),
    paint(
      'Night path again, without signal: largest paint',
      withoutSignal,
      withRouter,
      limits.withoutSignal,
    ),
    paint('A bare page: largest paint', bare, withRouter),
    budget('Night path: script', family.script, limits.familyKb),
    script('Night path: script', family.script, withRouter, 'bare with router'),
    script('Night path: script', family.script, bare, 'bare'),
    budget('Sign-in and This morning: script', clinicBytes, limits.clinicKb),
    script('Sign-in and This morning: script', clinicBytes, withRouter, 'bare with router'),
  ];
}
