import { once } from 'node:events';
import { connect } from 'node:net';
import type { ChildRecord } from '../../shared/contracts/children';
import type { LetterList } from '../../shared/contracts/letters';
import { addDays } from '../../shared/domain/zone';
import { FamilyPhone } from './support/family-phone';
import { password } from './support/house';
import { LetterDesk } from './support/letter-desk';
import {
  inviteMother,
  planMornings,
  prepareFamily,
  toMorningQuestion,
} from './support/prepared-family';
import { expect, test, toScreen } from './support/walk';

test('looking at a link ten times changes nothing: it still opens', async ({ house, people }) => {
  await house.awake();
  const family = await prepareFamily(house, {
    fullName: 'Juno Vale',
    callMe: 'Juno',
    phone: '+13125550196',
  });
  const look = async (link: string): Promise<void> => {
    for (let times = 0; times < 10; times += 1) {
      const answer = await fetch(link);
      expect(answer.status).toBe(200);
      expect(await answer.text()).not.toMatch(/Juno|Vale/);
    }
  };

  const invitation = await inviteMother(house, family);
  await look(invitation);
  const phone = new FamilyPhone(await people.phone());
  await phone.arrive(invitation, family.bornOn);
  await expect(phone.heading('Your visit')).toBeHidden();

  const link = await toMorningQuestion(house, family, await planMornings(house, family));
  await look(link);
  const other = new FamilyPhone(await people.phone());
  await other.arrive(link, family.bornOn, { isRemembered: false });
  await expect(other.heading(/eat or drink/)).toBeVisible();
  await look(link);
  await phone.page.goto(link);
  await expect(phone.heading(/eat or drink/)).toBeVisible();
});

test('a birth date that is wrong five times locks the link, and a person calls', async ({
  house,
  people,
  clean,
}) => {
  // The browser itself notes each refusal.
  clean.expecting(/status of (422|423)/);
  await house.awake();
  const family = await prepareFamily(house, {
    fullName: 'Wren Castell',
    callMe: 'Wren',
    phone: '+13125550197',
  });
  const invitation = await inviteMother(house, family);
  const phone = new FamilyPhone(await people.phone());
  await phone.page.goto(invitation);
  const open = phone.page.getByRole('button', { name: 'Open my visit' });
  await phone.typeBirthDate(addDays(family.bornOn, 1));
  for (const left of ['4 more times', '3 more times', '2 more times', '1 more time']) {
    await open.click();
    await expect(phone.page.getByRole('alert')).toContainText(left);
  }
  await open.click();
  await expect(phone.heading('This link is locked.')).toBeVisible();

  const again = new FamilyPhone(await people.phone());
  await again.page.goto(invitation);
  await expect(again.heading('This link is locked.')).toBeVisible();

  const rosa = await people.staff('rosa');
  await toScreen(rosa, 'Calls');
  await expect(
    rosa.locator('#list').getByText('Mother of Wren gave a wrong birth date five times.'),
  ).toBeVisible();
});

test('the front desk sees no results and no letters, in the menu or by address', async ({
  people,
}) => {
  const hanna = await people.staff('hanna');
  const menu = hanna.getByRole('navigation', { name: 'Screens' });
  await expect(menu.getByRole('link', { name: 'This morning' })).toBeVisible();
  for (const word of ['Results', 'Letters', 'Specimens', 'Orders', 'Access record'])
    await expect(menu.getByRole('link', { name: word, exact: true })).toBeHidden();

  for (const screen of ['results', 'letters', 'letters/1', 'specimens', 'access-record']) {
    await hanna.goto(`/clinic/en/${screen}`);
    await expect(hanna).toHaveURL(/\/clinic\/en\/this-morning$/);
  }
  for (const path of ['results', 'letters', 'letters/1.pdf', 'specimens'])
    expect((await hanna.request.get(`/api/clinic/${path}`)).status(), path).toBe(403);
});

test('a double click on "Plan" plans one series', async ({ house, people }) => {
  await house.awake();
  const family = await prepareFamily(house, {
    fullName: 'Odell Pike',
    callMe: 'Odell',
    phone: '+13125550198',
  });
  const rosa = await people.staff('rosa');
  await rosa.goto(`/clinic/en/series/plan?orders=${family.orderId}`);
  await rosa.getByRole('radio').first().check();
  await rosa.getByRole('button', { name: 'Plan these 3 mornings' }).dblclick();
  await expect(rosa.getByRole('heading', { name: /^Planned\./ })).toBeVisible();
  const record = await house.get<ChildRecord>(`/api/clinic/children/${family.childId}`);
  expect(record.series).toHaveLength(1);
  expect(record.series[0]?.mornings).toHaveLength(3);
});

test('a double click on "Sign and release" makes one letter and one notice', async ({
  house,
  people,
}) => {
  await house.awake();
  // A child of the demo clinic, all of whose cultures are final.
  const name = 'Trần Gia Linh';
  const motherPhone = '+13125550181';
  const before = (await house.standIns.texts(motherPhone)).length;
  const okafor = await people.staff('okafor');
  await toScreen(okafor, 'Letters');
  const desk = new LetterDesk(okafor);
  await desk.open(name);
  await desk.decide(addDays(await house.today(), 10));
  await okafor.getByLabel('Your password, at signing').fill(password);
  await desk.sign().dblclick();
  await expect(okafor.getByText('Signed and released.')).toBeVisible();

  await house.standIns.text(motherPhone, /A letter is ready/, before);
  const { letters } = await house.get<LetterList>('/api/clinic/letters');
  const ofChild = letters.filter(({ childName }) => childName === name);
  expect(ofChild.map(({ state }) => state)).toEqual(['released']);
  const record = await house.get<ChildRecord>(`/api/clinic/children/${ofChild[0]?.childId}`);
  expect(record.happenings.filter(({ says }) => says === 'Letter signed.')).toHaveLength(1);
  const notices = (await house.standIns.texts(motherPhone)).slice(before);
  expect(notices.filter(({ body }) => /A letter is ready/.test(body))).toHaveLength(1);
});

test('a visitor who leaves before the page has come does no harm', async ({ house }) => {
  const { hostname, port } = new URL(house.origin);
  const leaveEarly = async (): Promise<void> => {
    const socket = connect(Number(port), hostname);
    await once(socket, 'connect');
    socket.write(`GET /clinic/en/ HTTP/1.1\r\nHost: ${hostname}\r\n\r\n`, () => socket.destroy());
    await once(socket, 'close');
  };
  for (let round = 0; round < 10; round += 1) {
    await Promise.all(Array.from({ length: 10 }, leaveEarly));
    expect((await fetch(`${house.origin}/clinic/en/`)).status).toBe(200);
  }
});
