import type { Locator, Page } from '@playwright/test';
import { say } from './frame-words';
import { expect } from './walk';

export interface Entry {
  readonly specimen: number;
  readonly test: 'Smear' | 'Amplification' | 'Culture';
  readonly answer: string;
  readonly finality: 'preliminary' | 'final';
  readonly reportedOn: string;
}

/** Results of one child: entered by one person, confirmed by another. */
export class ResultsScreen {
  constructor(
    readonly page: Page,
    private readonly child: string,
  ) {}

  private series(): Locator {
    return this.page
      .locator('section.series')
      .filter({ has: this.page.getByRole('link', { name: this.child }) });
  }

  private specimen(number: number): Locator {
    const name = say(this.page, 'Specimen {}', number);
    return this.series()
      .locator('li.specimen')
      .filter({ has: this.page.getByRole('heading', { name, exact: true }) });
  }

  async enter({ specimen, test, answer, finality, reportedOn }: Entry): Promise<void> {
    const part = this.specimen(specimen);
    await part.getByRole('button', { name: say(this.page, 'Enter a result') }).click();
    await part.getByLabel(say(this.page, 'Test')).selectOption({ label: say(this.page, test) });
    await part
      .getByLabel(say(this.page, 'Answer on the report'))
      .selectOption({ label: say(this.page, answer) });
    await part.getByRole('radio', { name: say(this.page, finality) }).check();
    await part.getByLabel(say(this.page, 'Date of the report')).fill(reportedOn);
    await part.getByRole('button', { name: say(this.page, 'Keep this result') }).click();
    await expect(
      part.getByRole('button', { name: say(this.page, 'Enter a result') }),
    ).toBeVisible();
    await expect(part.locator('.answers')).toContainText(
      new RegExp(`${say(this.page, test)}: [^:]*, ${say(this.page, finality)}`),
    );
  }

  /** Confirms all that waits for this person's second look. @returns how many. */
  async confirmAll(): Promise<number> {
    const buttons = this.series().getByRole('button', {
      name: say(this.page, 'Confirm against the report'),
    });
    await expect(buttons.first()).toBeVisible();
    const count = await buttons.count();
    for (let left = count; left > 0; left -= 1) {
      await buttons.first().click();
      await expect(buttons).toHaveCount(left - 1);
    }
    return count;
  }
}
