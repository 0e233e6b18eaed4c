import type { Page } from '@playwright/test';
import { expect } from './walk';

export interface Adult {
  readonly fullName: string;
  readonly relationship: string;
  /** As typed; national. */
  readonly phone: string;
  readonly email: string | null;
  readonly isHelper: boolean;
}

export interface Child {
  readonly fullName: string;
  readonly callMe: string;
  readonly familyLabel: string;
  readonly bornOn: string;
  readonly adults: readonly Adult[];
}

/** The first adult is the mother, who agreed to texts, early texts and e-mail. */
export async function addChild(page: Page, child: Child): Promise<void> {
  await page.getByRole('link', { name: 'Add a child' }).click();
  await page.getByLabel('Full name').fill(child.fullName);
  await page.getByLabel('Called').fill(child.callMe);
  await page.getByLabel('Label in texts').fill(child.familyLabel);
  await page.getByLabel('Date of birth').fill(child.bornOn);
  for (const [index, adult] of child.adults.entries()) {
    if (index > 0) await page.getByRole('button', { name: 'Add another adult' }).click();
    await fillAdult(page, index + 1, adult);
  }
  await page.getByRole('button', { name: 'Keep this child' }).click();
  await expect(page.getByRole('heading', { level: 1, name: child.fullName })).toBeVisible();
}

async function fillAdult(page: Page, number: number, adult: Adult): Promise<void> {
  const part = page
    .locator('section')
    .filter({ has: page.getByRole('heading', { name: `Adult ${number}` }) });
  await part.getByLabel('Name, as the person writes it').fill(adult.fullName);
  await part.getByLabel('Relationship').fill(adult.relationship);
  await part.getByLabel('Telephone').fill(adult.phone);
  if (adult.isHelper) {
    await part.getByRole('combobox', { name: 'Standing' }).click();
    await page.getByRole('option', { name: /^Helper/ }).click();
  }
  await part.getByLabel('Agreed to texts about the mornings').check();
  await part.getByLabel('Agreed to texts before 8 in the morning').check();
  if (adult.email !== null) {
    await part.getByLabel('E-mail', { exact: true }).fill(adult.email);
    await part.getByLabel('Agreed to e-mail').check();
  }
}

export async function addOrder(page: Page, child: Child): Promise<void> {
  await page.getByRole('link', { name: 'New order' }).click();
  await page.getByLabel('Ordered by').fill('Dr. Ines Okafor');
  await page.getByLabel('Where to answer').fill('Alder Street, chest clinic, extension 12');
  await page.getByLabel('Reason').fill('Contact of a person with tuberculosis, cough for a month.');
  await page.getByLabel('Weight, kg').fill('11.9');
  await page.getByRole('button', { name: 'Keep this order' }).click();
  await expect(page.getByRole('heading', { name: `Order for ${child.fullName}` })).toBeVisible();
  await expect(page.getByText('Waits for a clinician’s signature')).toBeVisible();
}

export async function recordConsent(page: Page, mother: Adult): Promise<void> {
  await page.getByRole('combobox', { name: 'Who consents' }).click();
  await page.getByRole('option', { name: mother.fullName }).click();
  await page.getByLabel('Legal basis').fill('parent');
  await page.getByLabel('Version of the form').fill('A-3');
  await page.getByLabel('The child’s comfort plan').fill('On the lap, a song, the own blanket.');
  await page.getByRole('button', { name: 'Record this consent' }).click();
  await expect(page.getByText(`By ${mother.fullName}`)).toBeVisible();
}

export interface PlannedMorning {
  readonly on: string;
  /** 'HH:mm' of the clinic's clock. */
  readonly arrivalTime: string;
}

/** Chooses the first run that is offered, says who brings the child each day, and plans it. */
export async function planFirstRun(
  page: Page,
  child: Child,
  bringers: readonly Adult[],
): Promise<readonly PlannedMorning[]> {
  await page.getByRole('link', { name: 'Choose the mornings' }).click();
  await page.getByRole('radio').first().check();
  await expect(page.getByRole('heading', { name: child.fullName })).toBeVisible();
  const chosen = page.getByRole('combobox').and(page.locator('[id^="escort-"]'));
  await expect(chosen).toHaveCount(3);
  for (const [index, adult] of bringers.entries()) {
    const option = `${adult.fullName}, ${adult.relationship}`;
    await chosen.nth(index).selectOption({ label: option });
  }
  const ids = await chosen.evaluateAll((selects) => selects.map(({ id }) => id));
  const words = await page.locator('label.run.is-chosen').innerText();
  const times = [...words.matchAll(/\b\d{2}:\d{2}\b/g)].map(([time]) => time);
  await page.getByRole('button', { name: 'Plan these 3 mornings' }).click();
  await expect(
    page.getByRole('heading', { name: /^Planned\. The family will hear/ }),
  ).toBeVisible();
  return ids.map((id, index) => ({
    on: id.replace('escort-', ''),
    arrivalTime: times[index] ?? '',
  }));
}
