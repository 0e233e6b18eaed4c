import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import type {
  IndividualPlanPreview,
  IndividualPlans,
} from '../../../../shared/contracts/individual-plans';
import { IndividualPlansClient } from '../../../common/api/clinic/individual-plans-client';
import { OwnPlan } from './own-plan';

const none: IndividualPlans = {
  childId: 14,
  fullName: 'Nahom Tesfaye',
  neededBecause: ['diabetes'],
  isMissing: true,
  explains: [],
  versions: [],
  series: [{ id: 7, startsOn: '2027-04-13' }],
};
const shownAhead: IndividualPlanPreview = {
  problems: [],
  on: '2027-04-13',
  arrivalTime: '07:00',
  exampleSays: null,
  explains: [{ rule: 'fasting-plan.individual', inputs: {}, says: 'Plan: this child’s own.' }],
  languages: [
    { language: 'en', dir: 'ltr', isSigned: true, says: 'English', lines: ['2:00: No more food'] },
    { language: 'ar', dir: 'rtl', isSigned: false, says: 'Arabic: a person calls.', lines: [] },
  ],
};

const hoursOfFood = '[role="group"][aria-label="Solid food"] input.short';

async function shown() {
  const client = {
    ofChild: jest.fn().mockResolvedValue(none),
    preview: jest.fn().mockResolvedValue(shownAhead),
    sign: jest.fn().mockResolvedValue(none),
    end: jest.fn(),
  };
  TestBed.configureTestingModule({
    providers: [provideRouter([]), { provide: IndividualPlansClient, useValue: client }],
  });
  const fixture = TestBed.createComponent(OwnPlan);
  fixture.componentRef.setInput('childId', 14);
  await fixture.whenStable();
  const host = fixture.nativeElement as HTMLElement;
  const type = async (selector: string, text: string): Promise<void> => {
    const field = host.querySelector<HTMLInputElement>(selector);
    if (!field) throw new Error(`No field ${selector}`);
    field.value = text;
    field.dispatchEvent(new Event('input'));
    await fixture.whenStable();
  };
  const press = async (words: string): Promise<void> => {
    [...host.querySelectorAll('button')].find((one) => one.textContent?.includes(words))?.click();
    await fixture.whenStable();
  };
  return { client, fixture, host, press, type };
}

test('nothing is suggested, and an empty plan is refused beside its field before it is sent', async () => {
  const { client, host, press } = await shown();
  expect(
    [...host.querySelectorAll('input.short')].map((one) => (one as HTMLInputElement).value),
  ).toEqual(Array<string>(8).fill(''));
  expect(host.textContent).toContain('Needed because of diabetes.');
  expect(host.querySelector('.count')?.textContent).toBe('Nahom Tesfaye');
  await press('Show what the family reads');
  expect(client.preview).not.toHaveBeenCalled();
  expect(host.querySelector('.failed')?.textContent).toContain('Between a quarter of an hour');
});

test('is looked at before it is signed, and again after a change', async () => {
  const { client, host, press, type } = await shown();
  await type(hoursOfFood, '5');
  await type('[name="longest"]', '9');
  await press('Show what the family reads');
  expect(client.preview).toHaveBeenCalledWith(14, {
    seriesId: 7,
    body: expect.objectContaining({
      stops: [{ item: 'solid-food', leastHours: 5, nothingFrom: null }],
      longestHours: 9,
    }) as unknown,
  });
  expect(host.querySelector('.lines')?.textContent).toContain('2:00: No more food');
  expect(host.querySelector('.is-care')?.textContent).toContain('a person calls');
  await type('[name="longest"]', '8');
  await press('Sign this plan');
  expect(client.sign).not.toHaveBeenCalled();
  await press('Show what the family reads');
  await press('Sign this plan');
  expect(client.sign).toHaveBeenCalledWith(
    14,
    expect.objectContaining({ seriesId: 7, from: null, until: null, afterVersion: 0 }),
  );
  expect(host.querySelector('[role="status"]')?.textContent).toContain('Signed.');
});

test('what the server finds stands beside its field', async () => {
  const { client, host, press, type } = await shown();
  client.preview.mockResolvedValue({
    ...shownAhead,
    problems: [{ path: 'longestHours', message: 'Must be longer than 5 hours.' }],
    languages: [],
  });
  await type(hoursOfFood, '5');
  await type('[name="longest"]', '4');
  await press('Show what the family reads');
  expect(host.querySelector('[name="longest"]')?.getAttribute('aria-invalid')).toBe('true');
  expect(host.textContent).toContain('Must be longer than 5 hours.');
  await press('Sign this plan');
  expect(client.sign).not.toHaveBeenCalled();
});

test('a medicine with a sip asks for its time and its water', async () => {
  const { fixture, host, press, type } = await shown();
  await press('Add a medicine');
  await type('.medicine .grows input', 'Levetiracetam');
  expect(host.querySelector('.medicine .short')).toBeNull();
  const way = host.querySelector<HTMLSelectElement>('.medicine select');
  if (!way) throw new Error('No choice');
  way.value = 'usual-time-with-sip';
  way.dispatchEvent(new Event('change'));
  await fixture.whenStable();
  await press('Add a medicine');
  expect(host.querySelector('.medicine .short')).not.toBeNull();
  await press('Take out');
  expect(host.querySelectorAll('.medicine')).toHaveLength(1);
});
