import { TestBed } from '@angular/core/testing';
import { signal } from '@angular/core';
import { provideRouter } from '@angular/router';
import type { MorningRow } from '../../../../shared/contracts/this-morning';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { rulerOf } from '../../../common/ui/ruler/ruler-scale';
import { ChildRow } from './child-row';
import { MorningBoard, type RowNote } from './morning-board';
import { nextStep } from './next-step';
import { checkedRow, hereRow } from './row.testing';

const now = Date.parse('2027-04-06T11:20:00.000Z');
const zone = 'America/Chicago';

async function shown(row: MorningRow) {
  const notes = signal<ReadonlyMap<number, RowNote>>(new Map());
  const board = {
    notes,
    busyId: signal(null),
    lastAgent: signal(''),
    forgetNote: jest.fn(),
    checkAtDoor: jest.fn(),
    feed: jest.fn(),
  };
  TestBed.configureTestingModule({
    providers: [
      provideRouter([]),
      { provide: MorningBoard, useValue: board },
      { provide: ClinicClock, useValue: { time: () => now, now: () => now } },
      { provide: ClinicUser, useValue: { has: () => true } },
    ],
  });
  const fixture = TestBed.createComponent(ChildRow);
  const set = async (next: MorningRow, isNext = false): Promise<void> => {
    const step = nextStep(next, { now, zone, rooms: [], suggestion: null, has: () => true });
    fixture.componentRef.setInput('row', next);
    fixture.componentRef.setInput('step', step);
    fixture.componentRef.setInput('scale', rulerOf('2027-04-06', zone));
    fixture.componentRef.setInput('zone', zone);
    fixture.componentRef.setInput('isNext', isNext);
    await fixture.whenStable();
  };
  await set(row);
  const host = fixture.nativeElement as HTMLElement;
  const press = async (words: string): Promise<void> => {
    [...host.querySelectorAll('button')].find((one) => one.textContent?.includes(words))?.click();
    await fixture.whenStable();
  };
  const tick = async (value: string): Promise<void> => {
    host.querySelector<HTMLInputElement>(`input[value="${value}"]`)?.click();
    await fixture.whenStable();
  };
  return { board, fixture, host, press, set, tick };
}

test('state and verdict have a word, and the drawing is hidden from assistive technology', async () => {
  const { host } = await shown(hereRow());
  expect(host.querySelector('.state')?.textContent).toMatch(/Here\s+06:14/);
  expect(host.querySelector('.verdict')?.textContent).toContain('Long enough');
  expect(host.querySelector('td-hours-fasted-bar')?.getAttribute('aria-hidden')).toBe('true');
  expect(host.querySelector('.fast .unseen')?.textContent).toContain('Longest fast at 09:30');
});

test('only the suggested row has a filled button, and a tab', async () => {
  const { host, set } = await shown(hereRow());
  expect(host.querySelector('.do.first')).toBeNull();
  await set(hereRow(), true);
  expect(host.querySelectorAll('.do.first')).toHaveLength(1);
  expect(host.querySelector('.tab')?.textContent).toContain('Next');
});

test('six taps are sent as the request of the row as it is now', async () => {
  const { board, host, press, tick } = await shown(hereRow());
  board.checkAtDoor.mockResolvedValue(true);
  await press('Door check');
  await tick('none');
  await tick('well');
  await press('Keep this door check');
  expect(board.checkAtDoor).toHaveBeenCalledWith(
    expect.objectContaining({ morningId: 4 }),
    expect.objectContaining({
      version: 3,
      isNothingSincePlan: true,
      isWell: true,
      broughtBy: 'mother, Marta Tesfaye',
    }),
  );
  expect(host.querySelector('td-door-check-form')).toBeNull();
});

test('what is missing stands beside its field and nothing is sent', async () => {
  const { board, host, press } = await shown(hereRow());
  await press('Door check');
  await press('Keep this door check');
  expect(board.checkAtDoor).not.toHaveBeenCalled();
  expect(host.querySelector('td-door-check-form')?.textContent).toContain(
    'Say whether the child is well today.',
  );
});

test('a refused check keeps the form as typed, and a row that moved on says so', async () => {
  const { board, host, press, set, tick } = await shown(hereRow());
  board.checkAtDoor.mockResolvedValue(false);
  await press('Door check');
  await tick('none');
  await tick('not-well');
  await press('Keep this door check');
  const isStillTicked = (): boolean | undefined =>
    host.querySelector<HTMLInputElement>('input[value="not-well"]')?.checked;
  expect(isStillTicked()).toBe(true);
  await set(checkedRow({ version: 4 }));
  expect(isStillTicked()).toBe(true);
  expect(host.querySelector('.moved')?.textContent).toContain('This row has changed');
});
