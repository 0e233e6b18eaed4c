import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import { Subject } from 'rxjs';
import type { Closing } from '../../../../shared/contracts/closing';
import { ClosingClient } from '../../../common/api/clinic/closing-client';
import { LiveClient, type LiveNews } from '../../../common/api/clinic/live-client';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { CloseMorning } from './close-morning';

const open: Closing = {
  on: '2027-04-06',
  isToday: true,
  siteName: 'Harbor Clinic',
  zone: 'America/Chicago',
  closed: null,
  families: [
    {
      householdId: 1,
      children: [{ morningId: 4, fullName: 'Nahom Tesfaye', arrivalTime: '06:00' }],
      how: 'text',
      textAt: '2027-04-06T09:00:00.000Z',
      says: 'Text at once to Selam Tesfaye.',
      isClosed: false,
    },
  ],
  apart: [],
  textSays: 'Harbor Clinic: No visit on Tuesday, 6 April.',
};
const closed: Closing = {
  ...open,
  closed: {
    at: '2027-04-06T09:00:00.000Z',
    by: 'Rosa Lind',
    reason: 'snow',
    reasonSays: 'Snow or ice',
  },
  families: open.families.map((family) => ({ ...family, how: null, isClosed: true })),
};

async function screen() {
  const client = {
    look: jest.fn(() => Promise.resolve(open)),
    close: jest.fn(() => Promise.resolve(closed)),
  };
  TestBed.configureTestingModule({
    providers: [
      provideRouter([]),
      { provide: ClosingClient, useValue: client },
      { provide: LiveClient, useValue: { news: new Subject<LiveNews>() } },
      { provide: ClinicClock, useValue: { time: () => Date.parse('2027-04-06T09:00:00.000Z') } },
      { provide: ClinicUser, useValue: { zone: () => 'America/Chicago', has: () => true } },
    ],
  });
  const fixture = TestBed.createComponent(CloseMorning);
  await fixture.whenStable();
  const page = fixture.nativeElement as HTMLElement;
  const press = async (name: string): Promise<void> => {
    const button = [...page.querySelectorAll('button')].find((one) =>
      one.textContent.includes(name),
    );
    if (!button) throw new Error(`There is no button ${name}.`);
    button.click();
    await fixture.whenStable();
  };
  const choose = async (says: string): Promise<void> => {
    const label = [...page.querySelectorAll('label')].find((one) => one.textContent.includes(says));
    label?.querySelector('input')?.click();
    await fixture.whenStable();
  };
  return { page, client, press, choose };
}

test('shows today’s families and how each hears', async () => {
  const { page, client } = await screen();
  expect(client.look).toHaveBeenCalledWith('2027-04-06');
  expect(page.textContent).toContain('06:00 Nahom Tesfaye');
  expect(page.textContent).toContain('Text at once to Selam Tesfaye.');
});

test('asks why first, and for another reason which', async () => {
  const { page, client, press, choose } = await screen();
  await press('Close this morning');
  expect(page.textContent).toContain('Choose why the clinic stays closed.');
  await choose('Another reason');
  await press('Close this morning');
  expect(page.textContent).toContain('Say why in a few words.');
  expect(client.close).not.toHaveBeenCalled();
});

test('says that it cannot be undone, and closes only after a second yes', async () => {
  const { page, client, press, choose } = await screen();
  await choose('Snow or ice');
  await press('Close this morning');
  expect(page.textContent).toContain('This cannot be undone');
  expect(client.close).not.toHaveBeenCalled();
  await press('Not yet');
  expect(page.textContent).not.toContain('This cannot be undone');
  await press('Close this morning');
  await press('Close it and tell the families');
  expect(client.close).toHaveBeenCalledTimes(1);
  expect(client.close).toHaveBeenCalledWith('2027-04-06', { reason: 'snow', says: null });
  expect(page.textContent).toContain('by Rosa Lind');
  expect(page.querySelector('form')).toBeNull();
});
