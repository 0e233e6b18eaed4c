import type { Locator, Page } from '@playwright/test';
import { languageOf, type LanguageId } from '../../../shared/languages/languages';
import { say } from './frame-words';
import { expect } from './walk';

export interface Adult {
  readonly fullName: string;
  readonly relationship: string;
  /** As typed; national. */
  readonly phone: string;
  readonly email: string | null;
  readonly isHelper: boolean;
  /** English when it is not said. */
  readonly reads?: LanguageId;
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
  await page.getByRole('link', { name: say(page, 'Add a child') }).click();
  await page.getByLabel(say(page, 'Full name')).fill(child.fullName);
  await page.getByLabel(say(page, 'Called')).fill(child.callMe);
  await page.getByLabel(say(page, 'Label in texts')).fill(child.familyLabel);
  await page.getByLabel(say(page, 'Date of birth')).fill(child.bornOn);
  for (const [index, adult] of child.adults.entries()) {
    if (index > 0) await page.getByRole('button', { name: say(page, 'Add another adult') }).click();
    await fillAdult(page, index + 1, adult);
  }
  await page.getByRole('button', { name: say(page, 'Keep this child') }).click();
  await expect(page.getByRole('heading', { level: 1, name: child.fullName })).toBeVisible();
}

async function fillAdult(page: Page, number: number, adult: Adult): Promise<void> {
  const part = page
    .locator('section')
    .filter({ has: page.getByRole('heading', { name: say(page, 'Adult {}', number) }) });
  const label = (english: string, exact = false) => part.getByLabel(say(page, english), { exact });
  await label('Name, as the person writes it').fill(adult.fullName);
  await label('Relationship').fill(adult.relationship);
  await label('Telephone').fill(adult.phone);
  if (adult.isHelper)
    await choose(page, part, 'Standing', say(page, 'Helper, brings the child, sees no results'));
  if (adult.reads) {
    await choose(page, part, 'Reads', nameOf(page, adult.reads));
    await label('Speaks').fill(languageOf(adult.reads).englishName);
  }
  await label('Agreed to texts about the mornings').check();
  await label('Agreed to texts before 8 in the morning').check();
  if (adult.email !== null) {
    await label('E-mail', true).fill(adult.email);
    await label('Agreed to e-mail').check();
  }
}

async function choose(page: Page, part: Locator, english: string, option: string): Promise<void> {
  await part
    .getByRole('combobox', { name: say(page, english) })
    .first()
    .click();
  await page.getByRole('option', { name: option, exact: true }).click();
}

/** As staff calls the language. */
function nameOf(page: Page, language: LanguageId): string {
  const isEnglish = page.url().includes('/clinic/en/');
  const names = new Intl.DisplayNames(['es'], { type: 'language' });
  return isEnglish ? languageOf(language).englishName : (names.of(language) ?? '');
}

export async function addOrder(page: Page, child: Child): Promise<void> {
  await page.getByRole('link', { name: say(page, 'New order') }).click();
  await page.getByLabel(say(page, 'Ordered by')).fill('Dr. Ines Okafor');
  await page
    .getByLabel(say(page, 'Where to answer'))
    .fill('Alder Street, chest clinic, extension 12');
  await page
    .getByLabel(say(page, 'Reason'))
    .fill('Contact of a person with tuberculosis, cough for a month.');
  await page.getByLabel(say(page, 'Weight, kg')).fill('11.9');
  await page.getByRole('button', { name: say(page, 'Keep this order') }).click();
  const name = say(page, 'Order for {}', child.fullName);
  await expect(page.getByRole('heading', { name })).toBeVisible();
  await expect(page.getByText(say(page, 'Waits for a clinician’s signature'))).toBeVisible();
}

export async function recordConsent(page: Page, mother: Adult): Promise<void> {
  await page.getByRole('combobox', { name: say(page, 'Who consents') }).click();
  await page.getByRole('option', { name: mother.fullName }).click();
  await page.getByLabel(say(page, 'Legal basis')).fill('parent');
  await page.getByLabel(say(page, 'Version of the form')).fill('A-3');
  await page
    .getByLabel(say(page, 'The child’s comfort plan'))
    .fill('On the lap, a song, the own blanket.');
  await page.getByRole('button', { name: say(page, 'Record this consent') }).click();
  await expect(
    page.locator('[aria-labelledby=consent] .is-well').filter({ hasText: mother.fullName }),
  ).toBeVisible();
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
  await page.getByRole('link', { name: say(page, 'Choose the mornings') }).click();
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
  await page.locator('.decide button.first').click();
  await expect(
    page.getByRole('heading', { name: say(page, 'Planned. The family will hear:') }),
  ).toBeVisible();
  return ids.map((id, index) => ({
    on: id.replace('escort-', ''),
    arrivalTime: times[index] ?? '',
  }));
}
