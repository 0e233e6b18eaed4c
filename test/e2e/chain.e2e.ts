import { readFile } from 'node:fs/promises';
import { addDays, instantOf } from '../../shared/domain/zone';
import { calendarEntries } from './support/calendar-file';
import { FamilyPhone } from './support/family-phone';
import { zone } from './support/house';
import { planFirstRun, type Adult, type PlannedMorning } from './support/new-child';
import { RehearsalScreen } from './support/rehearsal-screen';
import { expectNeutral, linkIn } from './support/stand-ins';
import { ThisMorningScreen } from './support/this-morning-screen';
import { expect, test, toScreen } from './support/walk';
import {
  addWithOrder,
  bringResults,
  collect,
  releaseLetter,
  signAndConsent,
} from './support/whole-chain';

const mother: Adult = {
  fullName: 'Elif Aksoy',
  relationship: 'mother',
  phone: '312 555 0191',
  email: 'elif.aksoy@example.org',
  isHelper: false,
};
const grandmother: Adult = {
  fullName: 'Nurten Aksoy',
  relationship: 'grandmother',
  phone: '312 555 0192',
  email: null,
  isHelper: true,
};
const motherPhone = '+13125550191';
const grandmotherPhone = '+13125550192';
const motherMail = 'elif.aksoy@example.org';

// Families of the demo clinic; their children come on its next morning.
const salma = { name: 'Salma Haddad', phone: '+13125550121', child: 'Idris Haddad' };
const parwin = { name: 'Parwin Rahimi', phone: '+13125550111', child: 'Noor Rahimi' };

test('a child goes through the whole chain, from the order to the opened letter', async ({
  house,
  people,
}) => {
  test.setTimeout(300_000);
  const { standIns } = house;
  await house.awake();
  const child = {
    fullName: 'Deniz Aksoy',
    callMe: 'Deniz',
    familyLabel: 'Little bear',
    // Two years and two months: least 6 hours, longest 13.
    bornOn: addDays(await house.today(), -800),
    adults: [mother, grandmother],
  };
  const secrets = [child.fullName, child.callMe, child.bornOn, mother.fullName, 'Aksoy'];

  const rosa = await people.staff('rosa');
  const okafor = await people.staff('okafor');
  const desks = { house, rosa, okafor };
  const phone = new FamilyPhone(await people.phone());
  let mornings: readonly PlannedMorning[] = [];
  let household = '';

  await test.step('the nurse adds the child with the family, and the order', async () => {
    household = await addWithOrder(desks, child);
  });

  await test.step('the clinician signs the order, the nurse records the consent', async () => {
    await signAndConsent(desks, child);
  });

  await test.step('three mornings from the first run, with who brings the child', async () => {
    mornings = await planFirstRun(rosa, child, [mother, grandmother, mother]);
    expect(mornings).toHaveLength(3);
    await rosa.getByRole('link', { name: 'Open the record' }).click();
    await expect(rosa.locator('ol.mornings > li')).toHaveCount(3);
  });
  const [first] = mornings;
  if (!first) throw new Error('No morning was planned.');

  await test.step('calendar entries and the invitation reach phone and mailbox', async () => {
    const mails = await standIns.mailsLike(motherMail, /in the morning/, 3);
    // Each mail carries its entry twice: for calendars that read the mail, and as a file.
    const entries = new Map(
      mails.flatMap(({ attachments }) =>
        attachments.flatMap(({ content }) =>
          calendarEntries(content).map((entry) => [entry.uid, entry] as const),
        ),
      ),
    );
    expect([...entries.values()].map(({ startsAt }) => startsAt).sort()).toEqual(
      mornings.map(({ on, arrivalTime }) => instantOf({ on, time: arrivalTime, zone })),
    );
    for (const mail of mails) {
      expectNeutral(`${mail.subject} ${mail.body}`, secrets);
      for (const { content } of mail.attachments)
        expectNeutral(
          calendarEntries(content)
            .map(({ text }) => text)
            .join(),
          secrets,
        );
    }
    await rosa
      .locator('.member')
      .filter({ hasText: mother.fullName })
      .first()
      .getByRole('button', { name: 'Send the invitation' })
      .click();
    await expect(rosa.getByText('The invitation is on its way.')).toBeVisible();
    const text = await standIns.text(motherPhone, /\/i\//);
    const [mail] = await standIns.mailsLike(motherMail, /^Your visits/, 1);
    expectNeutral(text.body, secrets);
    expectNeutral(`${mail?.subject} ${mail?.body}`, secrets);
    expect(linkIn(mail?.body ?? '', 'i')).toBe(linkIn(text.body, 'i'));
  });

  await test.step('the mother opens the link, reads the night path, keeps the calendar file', async () => {
    const { body } = await standIns.text(motherPhone, /\/i\//);
    await phone.arrive(linkIn(body, 'i'), child.bornOn);
    await expect(phone.page).not.toHaveURL(/\/i\//);
    expect(await phone.page.title()).not.toMatch(/Deniz|Aksoy|tubercul/i);
    await expect(
      phone.page.getByRole('region', { name: 'Your night, step by step' }),
    ).toBeVisible();
    await expect(phone.page.getByRole('heading', { name: 'What to bring' })).toBeVisible();
    await phone.page.getByRole('link', { name: 'Calendar' }).click();
    await expect(phone.heading('Calendar')).toBeVisible();
    const download = phone.page.waitForEvent('download');
    await phone.page.getByRole('link', { name: 'Put them into my calendar' }).click();
    const entries = calendarEntries(await readFile(await (await download).path(), 'utf8'));
    expect(entries.map(({ title }) => title)).toEqual(Array(3).fill('Clinic visit'));
    const [mail] = await standIns.mailsLike(motherMail, /in the morning/, 3);
    const [mailed] = calendarEntries(mail?.attachments[0]?.content ?? '');
    const same = entries.find(({ uid }) => uid === mailed?.uid);
    expect(same?.sequence).toBe(mailed?.sequence);
    expect(same?.title).toBe(mailed?.title);
  });

  // In every language the question offers three digits, a line each.
  const digits = /^1\b.*\n2\b.*\n3\b/m;
  /** Whether the question of the morning has reached a phone, after so many texts. */
  const isAsked = async (to: string, after = 0): Promise<boolean> =>
    (await standIns.texts(to)).slice(after).some(({ body }) => digits.test(body));

  const board = new ThisMorningScreen(await rosa.context().newPage());
  await board.open();
  const rehearsal = new RehearsalScreen(rosa);
  await rehearsal.open();

  await test.step('the demo families answer by text, the open sheet and the calls follow', async () => {
    await rehearsal.toMoment(/^Evening text/);
    await rehearsal.toMoment(/^Morning question/);
    await rehearsal.onUntil(() => isAsked(salma.phone));
    await expect(board.said(salma.child)).toContainText('Nothing yet');
    const asked = (await standIns.texts(salma.phone)).length;
    await rehearsal.answer(salma.name, '1');
    await expect(board.said(salma.child)).toContainText(/nothing since/i);
    const thanks = await standIns.text(salma.phone, /Alder Street/, asked);
    expect(thanks.body).not.toMatch(digits);
    await rehearsal.answer(parwin.name, '2');
    await expect(board.said(parwin.child)).not.toContainText('Nothing yet');
    await toScreen(okafor, 'Calls');
    const call = okafor.locator('#list li.call').filter({ hasText: parwin.child });
    await expect(call).toContainText(`${parwin.name} was asked to call us before leaving.`);
  });

  const wholeMorning = async (morning: PlannedMorning, number: number): Promise<void> => {
    // Whoever brings the child is asked in the morning; the mother hears the plan every evening.
    const isGrandmother = number === 2;
    const [asked, bringer] = isGrandmother
      ? [grandmotherPhone, grandmother]
      : [motherPhone, mother];
    const before = (await standIns.texts(motherPhone)).length;
    const askedBefore = (await standIns.texts(asked)).length;
    await house.moveTo(instantOf({ on: addDays(morning.on, -1), time: '12:00', zone }));
    await rehearsal.toMoment(/^Evening text/);
    const evening = await standIns.text(motherPhone, /no food, no drink, no water/, before);
    expectNeutral(evening.body, secrets);
    expect(evening.body).toContain(child.familyLabel);
    await rehearsal.toMoment(/^Morning question/);
    await rehearsal.onUntil(() => isAsked(asked, askedBefore));
    const question = await standIns.text(asked, /1 = nothing/, askedBefore);
    expectNeutral(question.body, secrets);

    await expect(board.said(child.fullName)).toContainText('Nothing yet');
    const link = linkIn(question.body, 'm');
    const answering = isGrandmother ? new FamilyPhone(await people.phone()) : phone;
    if (isGrandmother) await answering.arrive(link, child.bornOn);
    else await answering.page.goto(link);
    await answering.answerNothing();
    await expect(answering.heading(/^Come\. Be at Door B/)).toBeVisible();
    await expect(board.said(child.fullName)).toContainText(/nothing since/i);
    await collect(desks, board, {
      child,
      morning,
      number,
      broughtBy: bringer.fullName,
      series: '91',
    });
    await board.expectNeverReloaded();
  };
  for (const [index, morning] of mornings.entries())
    await test.step(`morning ${index + 1}`, () => wholeMorning(morning, index + 1));

  await test.step('preliminary and final results, each final one with a second look', async () => {
    await bringResults(desks, child);
  });

  const textsBefore = (await standIns.texts(motherPhone)).length;
  await test.step('the letter that the results allow is signed and released', async () => {
    await releaseLetter(desks, child);
  });

  await test.step('the family hears that a letter waits, and nothing more', async () => {
    const text = await standIns.text(motherPhone, /A letter is ready/, textsBefore);
    const [mail] = await standIns.mailsLike(motherMail, /a letter is ready/, 1);
    expectNeutral(text.body, secrets);
    expectNeutral(`${mail?.subject} ${mail?.body}`, secrets);
    await phone.page.goto(linkIn(text.body, ''));
  });

  await test.step('the mother reads it with a code, the clinic sees that it was opened', async () => {
    expectNeutral(await phone.typeFreshCode(standIns, motherPhone, 'en'), secrets);
    const opened = await phone.openNewLetter();
    await expect(opened).toContainText(
      'Deniz can still have tuberculosis. In small children the germ is often not found',
    );
    await expect(opened).toContainText('This test alone does not rule it out.');

    expect((await phone.fetchPdf()).subarray(0, 5).toString()).toBe('%PDF-');

    await toScreen(okafor, 'Letters');
    const letter = okafor.locator('li.letter').filter({ hasText: child.fullName });
    await expect(letter.getByText(`${mother.fullName} opened it`)).toBeVisible();
    const address = await letter.getByRole('link', { name: 'Print' }).getAttribute('href');
    const pdf = await okafor.request.get(address ?? '');
    expect(pdf.status()).toBe(200);
    expect(pdf.headers()['content-type']).toContain('application/pdf');
    expect((await pdf.body()).subarray(0, 5).toString()).toBe('%PDF-');
  });

  await test.step('everything stands on the child’s record', async () => {
    await rosa.goto(household);
    const happened = rosa.getByRole('region', { name: 'Everything that happened' });
    await expect(happened).toContainText(/letter/i);
    await expect(happened).toContainText(/consent/i);
  });
});
