import type { Page } from '@playwright/test';
import { addDays, dayOf, instantOf } from '../../../shared/domain/zone';
import { say } from './frame-words';
import { zone, password, type House } from './house';
import { LetterDesk } from './letter-desk';
import { addChild, addOrder, recordConsent, type Child, type PlannedMorning } from './new-child';
import { ResultsScreen, type Entry } from './results-screen';
import { SpecimensScreen } from './specimens-screen';
import type { ThisMorningScreen } from './this-morning-screen';
import { expect, toScreen } from './walk';

/** Who takes a child through the chain, each at a desk of their own, in the language of their pages. */
export interface Desks {
  readonly house: House;
  /** The nurse's. */
  readonly rosa: Page;
  /** The clinician's. */
  readonly okafor: Page;
}

/** From nothing to an order without a signature. @returns the address of the child's record. */
export async function addWithOrder({ rosa }: Desks, child: Child): Promise<string> {
  await toScreen(rosa, 'Children');
  await addChild(rosa, child);
  const record = rosa.url();
  await addOrder(rosa, child);
  return record;
}

/** The clinician signs while the nurse has the order open, who records the consent of the first adult. */
export async function signAndConsent({ rosa, okafor }: Desks, child: Child): Promise<void> {
  const [mother] = child.adults;
  if (!mother) throw new Error('Nobody can consent.');
  await toScreen(okafor, 'Orders');
  await okafor.getByRole('link', { name: child.fullName }).click();
  await okafor.getByRole('button', { name: say(okafor, 'Sign this order') }).click();
  const signed = (page: Page) => page.getByText(say(page, 'Signed by {}, {}', 'Dr. Ines Okafor'));
  await expect(signed(okafor)).toBeVisible();
  await recordConsent(rosa, mother);
  await expect(signed(rosa)).toBeVisible();
}

/** From the door to the laboratory. */
export async function collect(
  { house, okafor }: Desks,
  board: ThisMorningScreen,
  {
    child,
    morning,
    number,
    broughtBy,
    series,
  }: {
    child: Child;
    morning: PlannedMorning;
    number: number;
    broughtBy: string;
    /** Tells the labels of this child from those of every other walk in the house. */
    series: string;
  },
): Promise<void> {
  await house.moveTo(instantOf({ on: morning.on, time: morning.arrivalTime, zone }));
  await board.run(child.fullName, { label: `AS-${series}${number}`, broughtBy });
  await toScreen(okafor, 'Specimens');
  await new SpecimensScreen(okafor).toLaboratory(child.fullName, number, `L${series}${number}`);
}

/** Preliminary and final results of three mornings, all without the germ, each final one with a second look. */
export async function bringResults({ house, rosa, okafor }: Desks, child: Child): Promise<void> {
  await house.moveDays(8);
  await toScreen(rosa, 'Results');
  const results = new ResultsScreen(rosa, child.fullName);
  const enter = async (specimen: number, answer: Omit<Entry, 'specimen' | 'reportedOn'>) =>
    results.enter({ ...answer, specimen, reportedOn: await house.today() });
  await enter(1, { test: 'Smear', answer: 'No acid-fast bacilli seen', finality: 'final' });
  await enter(1, { test: 'Amplification', answer: 'Not detected', finality: 'final' });
  for (const specimen of [1, 2, 3])
    await enter(specimen, {
      test: 'Culture',
      answer: 'No growth so far',
      finality: 'preliminary',
    });
  await house.moveDays(36);
  await house.awake();
  for (const specimen of [1, 2, 3])
    await enter(specimen, {
      test: 'Culture',
      answer: 'No growth, culture ended',
      finality: 'final',
    });
  await toScreen(okafor, 'Results');
  expect(await new ResultsScreen(okafor, child.fullName).confirmAll()).toBe(5);
}

/** The letter that the results allow, signed and released at the clinician's desk. */
export async function releaseLetter({ house, okafor }: Desks, child: Child): Promise<void> {
  await toScreen(okafor, 'Letters');
  const desk = new LetterDesk(okafor);
  await desk.open(child.fullName);
  const nextVisit = addDays(dayOf(await house.now(), zone), 14);
  await desk.settle({ nextVisit, password });
}
