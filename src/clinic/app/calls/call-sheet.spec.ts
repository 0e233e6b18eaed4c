import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import type { CallDoneRequest, CallTask } from '../../../../shared/contracts/calls';
import { CallSheet } from './call-sheet';

const task = (more: Partial<CallTask> = {}): CallTask => ({
  id: 1,
  reason: 'not-answered',
  says: 'Roseline Baptiste has not answered.',
  childId: 15,
  childName: 'Juniel Baptiste',
  familyMember: {
    id: 5,
    fullName: 'Roseline Baptiste',
    relationship: 'mother',
    phone: '555-0161',
    speaks: 'Haitian Creole',
    needsInterpreter: true,
  },
  script: ['Good morning.'],
  isForClinician: false,
  urgentAt: '2027-04-06T11:30:00.000Z',
  createdAt: '2027-04-06T10:00:00.000Z',
  claimedBy: null,
  ...more,
});

async function sheetOf(call: CallTask) {
  TestBed.configureTestingModule({ providers: [provideRouter([])] });
  const fixture = TestBed.createComponent(CallSheet);
  fixture.componentRef.setInput('call', call);
  fixture.componentRef.setInput('zone', 'America/Chicago');
  fixture.componentRef.setInput('mayWrite', true);
  const done: CallDoneRequest[] = [];
  fixture.componentInstance.done.subscribe((request) => done.push(request));
  await fixture.whenStable();
  const host = fixture.nativeElement as HTMLElement;
  const tap = async (words: string): Promise<void> => {
    const button = [...host.querySelectorAll<HTMLElement>('.outcome button, .outcome label')].find(
      (one) => one.textContent?.includes(words),
    );
    (button?.querySelector('input') ?? button)?.click();
    await fixture.whenStable();
  };
  const type = async (id: string, words: string): Promise<void> => {
    const field = host.querySelector<HTMLInputElement>(id);
    if (!field) throw new Error(`no field ${id}`);
    field.value = words;
    field.dispatchEvent(new Event('input'));
    await fixture.whenStable();
  };
  return { fixture, host, done, tap, type };
}

test('the first tap sends nothing and opens the second', async () => {
  const { host, done, tap } = await sheetOf(task());
  expect(host.querySelector('.tap-two')).toBeNull();
  await tap('No answer');
  expect(done).toEqual([]);
  expect(host.querySelectorAll('.tap-two button')).toHaveLength(2);
});

test('the second tap is the answer', async () => {
  const { done, tap, type } = await sheetOf(task());
  await type('.outcome input[type=text]', 'Rang twice.');
  await tap('No answer');
  await tap('A machine: said only our number');
  expect(done).toEqual([
    {
      outcome: 'not-reached',
      interpreter: null,
      note: 'A machine answered; said only our number. Rang twice.',
    },
  ]);
});

test('who was told through an interpreter is kept with the interpreter’s name', async () => {
  const { host, done, tap, type } = await sheetOf(task());
  await tap('Someone answered');
  await tap('Told everything');
  expect(done).toEqual([]);
  expect(host.querySelector('#interpreter-says')?.textContent).toMatch(/interpreter’s name/);
  await type('#interpreter-name', '4471');
  await tap('Told everything');
  expect(done).toEqual([{ outcome: 'told', interpreter: '4471', note: null }]);
});

test('without an interpreter needed the name may stay empty', async () => {
  const familyMember = { ...task().familyMember!, needsInterpreter: false };
  const { done, tap } = await sheetOf(task({ familyMember }));
  await tap('Someone answered');
  await tap('Told everything');
  expect(done).toHaveLength(1);
});

test('what was typed stays when the list is fetched again, and goes with the next call', async () => {
  const { fixture, host, type } = await sheetOf(task());
  const typed = (): string | undefined =>
    host.querySelector<HTMLInputElement>('#interpreter-name')?.value;
  await type('#interpreter-name', '4471');
  fixture.componentRef.setInput('call', task({ claimedBy: 'Kofi Asante' }));
  await fixture.whenStable();
  expect(typed()).toBe('4471');
  fixture.componentRef.setInput('call', task({ id: 2 }));
  await fixture.whenStable();
  expect(typed()).toBe('');
});

test('a result call shows what the server lets see and nothing else', async () => {
  const { host } = await sheetOf(
    task({ reason: 'about-results', says: 'A call about results.', script: ['Good morning.'] }),
  );
  expect(host.querySelector('.verdict')?.textContent).toContain('A call about results.');
  expect(host.querySelectorAll('.script .line')).toHaveLength(1);
});
