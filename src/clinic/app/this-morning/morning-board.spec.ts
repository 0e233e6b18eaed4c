import { TestBed } from '@angular/core/testing';
import { Subject } from 'rxjs';
import type { MorningRow } from '../../../../shared/contracts/this-morning';
import { ClinicFailure } from '../../../common/api/clinic/clinic-http';
import { LiveClient, type LiveNews } from '../../../common/api/clinic/live-client';
import { MorningBoardClient } from '../../../common/api/clinic/morning-board-client';
import { SpecimensClient } from '../../../common/api/clinic/specimens-client';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MorningBoard } from './morning-board';
import { aRow, aSheet, aSpecimen, checkedRow, hereRow } from './row.testing';

const conflict = new ClinicFailure(409, {
  type: 'about:blank',
  title: 'Somebody changed this in the meantime.',
  status: 409,
  code: 'changed-meanwhile',
});

async function boardWith(row: MorningRow) {
  const client = {
    day: jest.fn(() => Promise.resolve(aSheet([row]))),
    arrive: jest.fn(),
    checkAtDoor: jest.fn(),
    feed: jest.fn(),
  };
  const specimens = { step: jest.fn() };
  const news = new Subject<LiveNews>();
  TestBed.configureTestingModule({
    providers: [
      MorningBoard,
      { provide: MorningBoardClient, useValue: client },
      { provide: SpecimensClient, useValue: specimens },
      { provide: LiveClient, useValue: { news } },
      {
        provide: ClinicClock,
        useValue: {
          follow: jest.fn(),
          time: () => Date.parse('2027-04-06T11:20:00.000Z'),
          instant: () => '2027-04-06T11:20:00.000Z',
        },
      },
      { provide: ClinicUser, useValue: { zone: () => 'America/Chicago' } },
    ],
  });
  const board = TestBed.inject(MorningBoard);
  await board.open(null);
  return { board, client, specimens, news };
}

const request = {
  version: 3,
  lastFoodAt: null,
  lastDrinkAt: null,
  isNothingSincePlan: true,
  wokeAt: null,
  isWell: true,
  broughtBy: 'mother',
};

test('a step that was kept changes the row and tells its warnings', async () => {
  const { board, client } = await boardWith(aRow());
  client.arrive.mockResolvedValue({ row: hereRow({ version: 4 }), warnings: ['Mask, please.'] });
  client.day.mockResolvedValue(aSheet([hereRow({ version: 4 })]));
  expect(await board.arrive(aRow())).toBe(true);
  expect(client.arrive).toHaveBeenCalledWith(4, 3);
  expect(board.notes().get(4)).toMatchObject({ isFailure: false, lines: ['Mask, please.'] });
  expect(board.news()?.says).toBe('Nahom Tesfaye is here since 06:14.');
});

test('somebody was quicker: the row is fetched again and says who did what', async () => {
  const before = hereRow();
  const { board, client } = await boardWith(before);
  client.day.mockResolvedValue(aSheet([checkedRow({ version: 4 })]));
  client.checkAtDoor.mockRejectedValue(conflict);
  expect(await board.checkAtDoor(before, request)).toBe(false);
  expect(board.loaded.value()?.rows[0]?.version).toBe(4);
  const note = board.notes().get(4);
  expect(note?.isFailure).toBe(true);
  expect(note?.lines).toEqual([
    'Somebody was quicker.',
    'Kofi Asante checked Nahom Tesfaye at the door at 06:17. Nothing since the plan’s time, well.',
    expect.stringMatching(/^Nothing that you typed is lost/),
  ]);
  expect(board.busyId()).toBeNull();
});

test('what the server refuses stands beside its field', async () => {
  const { board, client } = await boardWith(hereRow());
  client.checkAtDoor.mockRejectedValue(
    new ClinicFailure(422, {
      type: 'about:blank',
      title: 'Some answers need another look.',
      status: 422,
      code: 'invalid',
      errors: [{ path: 'lastFoodAt', message: 'This time has not come yet.' }],
    }),
  );
  expect(await board.checkAtDoor(hereRow(), request)).toBe(false);
  expect(board.notes().get(4)?.fields.get('lastFoodAt')).toBe('This time has not come yet.');
});

test('without the server the sheet stays and the row says that nothing was kept', async () => {
  const { board, client } = await boardWith(hereRow());
  client.feed.mockRejectedValue(new ClinicFailure(0, null));
  client.day.mockRejectedValue(new ClinicFailure(0, null));
  expect(await board.feed(hereRow(), 'fed')).toBe(false);
  await board.loaded.again();
  expect(board.loaded.value()?.rows).toHaveLength(1);
  expect(board.loaded.failure()).not.toBeNull();
  expect(board.notes().get(4)?.lines).toEqual(['The server does not answer.']);
});

test('a second tap while the first is on its way changes nothing', async () => {
  const { board, client } = await boardWith(aRow());
  let finish: (value: unknown) => void = () => undefined;
  client.arrive.mockReturnValue(new Promise((resolve) => (finish = resolve)));
  const first = board.arrive(aRow());
  expect(await board.arrive(aRow())).toBe(false);
  finish({ row: hereRow({ version: 4 }), warnings: [] });
  expect(await first).toBe(true);
  expect(client.arrive).toHaveBeenCalledTimes(1);
});

test('neutralising goes to the specimen with its own version', async () => {
  const row = aRow({ state: 'collected', specimen: aSpecimen({ version: 7 }) });
  const { board, specimens } = await boardWith(row);
  specimens.step.mockResolvedValue({ warnings: [] });
  expect(await board.neutralise(row, 'sodium carbonate')).toBe(true);
  expect(specimens.step).toHaveBeenCalledWith(9, {
    step: 'neutralised',
    version: 7,
    at: '2027-04-06T11:20:00.000Z',
    with: 'sodium carbonate',
  });
  expect(board.lastAgent()).toBe('sodium carbonate');
});

test('live changes are fetched once they have settled', async () => {
  jest.useFakeTimers();
  try {
    const { client, news } = await boardWith(aRow());
    news.next({ topic: 'mornings', refId: 4 });
    news.next({ topic: 'mornings', refId: 4 });
    news.next({ topic: 'letters', refId: 1 });
    jest.advanceTimersByTime(400);
    expect(client.day).toHaveBeenCalledTimes(2);
  } finally {
    jest.useRealTimers();
  }
});
