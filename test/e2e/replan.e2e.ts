import { calendarEntries } from './support/calendar-file';
import { prepareFamily, planMornings } from './support/prepared-family';
import { expectNeutral } from './support/stand-ins';
import { expect, test } from './support/walk';

const phone = '+13125550159';
const email = 'mother.of.ayla@example.org';
/** What a change would make is made and undone on the server, with everything the family would hear. */
const patient = { timeout: 30_000 };
const reason = 'Fever on Tuesday, well again since.';

test('a lost morning, the next possible one, and a family that hears it', async ({
  house,
  people,
}) => {
  test.setTimeout(180_000);
  const { standIns } = house;
  await house.awake();
  const family = await prepareFamily(house, {
    fullName: 'Ayla Demir',
    callMe: 'Ayla',
    phone,
    email,
  });
  await planMornings(house, family);
  const secrets = [family.fullName, family.callMe, family.bornOn];
  const invited = await standIns.mailsLike(email, /in the morning/, 3);
  const entriesOf = (mails: typeof invited) =>
    mails.flatMap(({ attachments }) =>
      attachments.flatMap(({ content }) =>
        calendarEntries(content).map((entry) => ({ ...entry, content })),
      ),
    );
  const before = new Map(entriesOf(invited).map((entry) => [entry.uid, entry]));

  const rosa = await people.staff('rosa');
  await test.step('the nurse gives the second morning up', async () => {
    await rosa.goto(`/clinic/en/children/${family.childId}`);
    const second = rosa.locator('ol.mornings > li').nth(1);
    await second.getByRole('button', { name: 'Give up' }).click();
    await second.getByLabel('Why this morning is given up').fill('Fever');
    await second.getByRole('button', { name: 'Give it up and tell the family' }).click();
    await expect(rosa.locator('ol.mornings > li[data-state="lost"]')).toHaveCount(1);
    const [cancelled] = entriesOf(await standIns.mailsLike(email, /no visit/, 1));
    expect(cancelled?.content).toMatch(/METHOD:CANCEL/);
    expect(cancelled?.sequence).toBe((before.get(cancelled?.uid ?? '')?.sequence ?? 0) + 1);
  });

  await test.step('the nurse may look, and leaves the choice to a clinician', async () => {
    await rosa.getByRole('link', { name: 'Re-plan these mornings' }).click();
    await rosa.getByRole('radio', { name: /^The next possible morning/ }).check();
    await expect(rosa.getByText('A clinician chooses.')).toBeVisible(patient);
    await expect(rosa.getByRole('button', { name: /tell the family$/ })).toHaveCount(0);
  });

  const okafor = await people.staff('okafor');
  const texts = (await standIns.texts(phone)).length;
  await test.step('the clinician sees before and after, says why, and chooses', async () => {
    await okafor.goto(rosa.url());
    const wouldBe = okafor.getByRole('region', { name: 'Before and after' });
    await expect(okafor.getByRole('radio', { name: /^The next possible morning/ })).toBeChecked();
    await expect(wouldBe.locator('tr[data-change="new"]')).toHaveCount(1, patient);
    await expect(wouldBe.getByText('No specimen of Ayla was taken so far.')).toBeVisible();
    await okafor.getByRole('button', { name: 'Change the mornings and tell the family' }).click();
    await expect(okafor.getByText('Fill this in.')).toBeVisible();
    await okafor.getByLabel('Why').fill(reason);
    await okafor.getByRole('button', { name: 'Change the mornings and tell the family' }).click();
    await expect(okafor.getByRole('heading', { name: /^Done\./ })).toBeVisible(patient);
  });

  await test.step('the family hears every day that is left, and gets an entry for the new one', async () => {
    const text = await standIns.text(phone, /new days/, texts);
    expectNeutral(text.body, secrets);
    expect(text.body.split('\n')).toHaveLength(5);
    const all = entriesOf(await standIns.mailsLike(email, /in the morning/, 4));
    const fresh = all.filter(({ uid }) => !before.has(uid));
    expect(new Set(fresh.map(({ uid }) => uid)).size).toBe(1);
    expect(fresh[0]?.sequence).toBe(0);
  });

  await test.step('a morning that moves keeps its entry, with the next sequence', async () => {
    await rosa.reload();
    await rosa.locator('.tap').first().getByRole('checkbox').check();
    await rosa.getByRole('radio', { name: /^Other days or times/ }).check();
    await rosa.locator('label.run').last().getByRole('radio').check();
    await expect(rosa.locator('tr[data-change="moved"]').first()).toBeVisible(patient);
    await rosa.getByLabel('Why').fill('The family is away that week.');
    await rosa.getByRole('button', { name: 'Change the mornings and tell the family' }).click();
    await expect(rosa.getByRole('heading', { name: /^Done\./ })).toBeVisible(patient);
    const all = entriesOf(await standIns.mailsLike(email, /in the morning/, 5));
    const moved = all.filter(({ sequence }) => sequence > 0);
    expect(new Set(moved.map(({ uid }) => uid)).size).toBe(1);
    expect(before.get(moved[0]?.uid ?? '')?.startsAt).not.toBe(moved[0]?.startsAt);
  });
});
