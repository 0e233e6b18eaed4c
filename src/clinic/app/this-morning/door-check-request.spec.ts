import {
  doorCheckRequestOf,
  doorCheckStart,
  emptyDoorCheck,
  somebodyElse,
  type DoorCheckValues,
} from './door-check-request';
import { doorTime } from './door-time';
import { aRow } from './row.testing';

const zone = 'America/Chicago';
const now = Date.parse('2027-04-06T11:20:00.000Z'); // 06:20
const answered: DoorCheckValues = {
  ...emptyDoorCheck,
  intake: 'nothing',
  medicine: 'none',
  well: 'well',
  broughtBy: 'mother, Marta Tesfaye',
};
const requestOf = (more: Partial<DoorCheckValues>, at = now) =>
  doorCheckRequestOf({ ...answered, ...more }, { version: 3, now: at, zone });

describe('what the form starts with', () => {
  const start = (told: ReturnType<typeof aRow>['told']) => doorCheckStart(aRow({ told }), zone);

  test.each([
    [{ answer: 'nothing', lastIntakeAt: null }, { intake: 'nothing' }],
    [
      { answer: 'feed', lastIntakeAt: '2027-04-06T07:40:00.000Z' },
      { intake: 'breast-milk', lastFood: '02:40', lastDrink: '' },
    ],
    [
      { answer: 'sip', lastIntakeAt: '2027-04-06T09:00:00.000Z' },
      { intake: 'water', lastFood: '', lastDrink: '04:00' },
    ],
    [{ answer: 'feed', lastIntakeAt: null }, { intake: 'unknown' }],
    [{ answer: 'unsure', lastIntakeAt: null }, { intake: 'unknown' }],
    [null, { intake: '' }],
  ] as const)('told %j', (told, expected) => {
    expect(start(told)).toMatchObject(expected);
  });

  test('medicine and "well today" are always asked, the escort is filled in', () => {
    expect(start(null)).toMatchObject({
      medicine: '',
      well: '',
      broughtBy: 'mother, Marta Tesfaye',
    });
  });
});

describe('the request', () => {
  test('six taps', () => {
    expect(requestOf({})).toEqual({
      request: {
        version: 3,
        lastFoodAt: null,
        foodItem: null,
        lastDrinkAt: null,
        drinkItem: null,
        isNothingSincePlan: true,
        medicine: null,
        wokeAt: null,
        isWell: true,
        bloodGlucoseMgDl: null,
        broughtBy: 'mother, Marta Tesfaye',
        goOnReason: null,
      },
    });
  });

  test('times of last evening and of this morning', () => {
    expect(
      requestOf({ intake: 'solid-food', lastFood: '20:10', lastDrink: '02:40', woke: '05:05' }),
    ).toMatchObject({
      request: {
        isNothingSincePlan: false,
        lastFoodAt: '2027-04-06T01:10:00.000Z',
        foodItem: 'solid-food',
        lastDrinkAt: '2027-04-06T07:40:00.000Z',
        drinkItem: 'water',
        wokeAt: '2027-04-06T10:05:00.000Z',
      },
    });
  });

  test('times typed before the answer was changed to "nothing" are not sent', () => {
    expect(requestOf({ lastFood: '20:10' })).toMatchObject({ request: { lastFoodAt: null } });
  });

  test('a sip of water is no meal, another drink is no water', () => {
    expect(requestOf({ intake: 'water', lastDrink: '04:00' })).toMatchObject({
      request: { lastFoodAt: null, foodItem: null, drinkItem: 'water' },
    });
    expect(
      requestOf({ intake: 'other', lastDrink: '04:00', lastFood: '21:00', glucose: ' 88 ' }),
    ).toMatchObject({
      request: {
        lastFoodAt: '2027-04-06T02:00:00.000Z',
        foodItem: null,
        drinkItem: 'other',
        bloodGlucoseMgDl: 88,
      },
    });
  });

  test('each thing needs its own time, a glucose its number', () => {
    const faultsOf = (more: Partial<DoorCheckValues>) => {
      const open = requestOf(more);
      return 'faults' in open ? Object.keys(open.faults) : [];
    };
    expect(faultsOf({ intake: 'water', lastFood: '21:00' })).toEqual(['lastDrink']);
    expect(faultsOf({ intake: 'formula', lastDrink: '04:00' })).toEqual(['lastFood']);
    expect(faultsOf({ glucose: 'high' })).toEqual(['glucose']);
    expect(faultsOf({ glucose: '5' })).toEqual(['glucose']);
  });

  test('each missing answer has its sentence beside its field', () => {
    const missing = doorCheckRequestOf(emptyDoorCheck, { version: 3, now, zone });
    expect('faults' in missing && Object.keys(missing.faults)).toEqual([
      'intake',
      'medicine',
      'well',
      'broughtBy',
    ]);
  });

  test('"somebody else" needs a name, "given" a medicine, "time known" a time', () => {
    const missing = requestOf({
      intake: 'solid-food',
      medicine: 'given',
      broughtBy: somebodyElse,
    });
    expect('faults' in missing && Object.keys(missing.faults)).toEqual([
      'lastFood',
      'medicineSays',
      'broughtBy',
    ]);
  });
});

describe('the night when the clock goes back (7 November 2027 in Chicago)', () => {
  const morning = Date.parse('2027-11-07T12:20:00.000Z'); // 06:20 CST

  test('01:30 came twice', () => {
    expect(doorTime('01:30', morning, zone)).toEqual({
      kind: 'twice',
      earlier: Date.parse('2027-11-07T06:30:00.000Z'),
      later: Date.parse('2027-11-07T07:30:00.000Z'),
    });
  });

  test('the nurse says which one before it is sent', () => {
    const open = requestOf({ intake: 'solid-food', lastFood: '01:30' }, morning);
    expect('faults' in open && open.faults['lastFood']).toMatch(/twice/);
    expect(
      requestOf({ intake: 'solid-food', lastFood: '01:30', lastFoodReading: 'earlier' }, morning),
    ).toMatchObject({ request: { lastFoodAt: '2027-11-07T06:30:00.000Z' } });
    expect(
      requestOf({ intake: 'solid-food', lastFood: '01:30', lastFoodReading: 'later' }, morning),
    ).toMatchObject({ request: { lastFoodAt: '2027-11-07T07:30:00.000Z' } });
  });

  test('between the two only the first has come', () => {
    const between = Date.parse('2027-11-07T07:00:00.000Z');
    expect(doorTime('01:30', between, zone)).toEqual({
      kind: 'once',
      at: Date.parse('2027-11-07T06:30:00.000Z'),
    });
  });

  test('21:00 of the evening before is thirteen hours back at nine', () => {
    const nine = Date.parse('2027-11-07T15:00:00.000Z');
    const read = doorTime('21:00', nine, zone);
    expect(read?.kind === 'once' && (nine - read.at) / 3_600_000).toBe(13);
  });
});

describe('the night when the clock goes forward (14 March 2027 in Chicago)', () => {
  const morning = Date.parse('2027-03-14T11:20:00.000Z'); // 06:20 CDT

  test('02:30 never came; the nurse says which clock was meant', () => {
    expect(doorTime('02:30', morning, zone)).toEqual({
      kind: 'never',
      earlier: Date.parse('2027-03-14T07:30:00.000Z'),
      later: Date.parse('2027-03-14T08:30:00.000Z'),
    });
    const open = requestOf({ intake: 'water', lastDrink: '02:30' }, morning);
    expect('faults' in open && open.faults['lastDrink']).toMatch(/jumped/);
  });
});

test.each(['', '6:20', '24:00', 'seven'])('%j is no clock time', (text) => {
  expect(doorTime(text, now, zone)).toBeNull();
});
