import type { MorningRow, ThisMorning } from '../../../../shared/contracts/this-morning';

/** An invented child who is expected at 06:30 in Chicago on 6 April 2027 and has answered. */
export const aRow = (more: Partial<MorningRow> = {}): MorningRow => ({
  morningId: 4,
  version: 3,
  childId: 14,
  fullName: 'Nahom Tesfaye',
  ageInWords: '9 months',
  feeding: 'breast',
  number: 1,
  ofPlanned: 3,
  suns: ['next', 'later', 'later'],
  arrivalTime: '06:30',
  arrivalAt: '2027-04-06T11:30:00.000Z',
  expectedAt: null,
  arrivedAt: null,
  state: 'planned',
  room: { id: 1, name: 'Room 1' },
  speaks: 'Amharic',
  needsInterpreter: true,
  escort: 'mother, Marta Tesfaye',
  phones: [{ name: 'Marta Tesfaye', relationship: 'mother', phone: '555-0141' }],
  cautions: [],
  warnings: [],
  said: [{ at: '2027-04-06T09:51:00.000Z', source: 'On the page', says: 'Nothing.' }],
  told: { answer: 'nothing', lastIntakeAt: null },
  planStopAt: '2027-04-06T06:30:00.000Z',
  verdict: 'long-enough',
  verdictSays: 'Long enough',
  fastedMinutes: 285,
  readyAt: '2027-04-06T10:30:00.000Z',
  ceiling: 'ok',
  bar: {
    fromAt: '2027-04-06T06:30:00.000Z',
    isPlanOnly: false,
    isUnsure: false,
    leastAt: '2027-04-06T10:30:00.000Z',
    longestAt: '2027-04-06T14:30:00.000Z',
    likelyCollectionAt: '2027-04-06T11:45:00.000Z',
    collectedAt: null,
  },
  explains: [],
  doorCheck: null,
  collection: null,
  specimen: null,
  fedAt: null,
  leftAt: null,
  ...more,
});

export const hereRow = (more: Partial<MorningRow> = {}): MorningRow =>
  aRow({ state: 'here', arrivedAt: '2027-04-06T11:14:00.000Z', ...more });

export const checkedRow = (more: Partial<MorningRow> = {}): MorningRow =>
  hereRow({
    doorCheck: {
      at: '2027-04-06T11:17:00.000Z',
      by: 'Kofi Asante',
      says: 'Nothing since the plan’s time, well.',
      verdict: 'long-enough',
    },
    ...more,
  });

export const aSpecimen = (
  more: Partial<NonNullable<MorningRow['specimen']>> = {},
): NonNullable<MorningRow['specimen']> => ({
  id: 9,
  version: 1,
  number: 1,
  label: 'A-1',
  volumeMl: 8,
  collectedAt: '2027-04-06T11:04:00.000Z',
  neutralisedAt: null,
  neutraliseBy: '2027-04-06T11:34:00.000Z',
  receiptBy: '2027-04-06T14:30:00.000Z',
  handedOverAt: null,
  receivedAt: null,
  ...more,
});

export const aSheet = (rows: MorningRow[], more: Partial<ThisMorning> = {}): ThisMorning => ({
  site: { id: 1, name: 'Alder Street', door: 'B', zone: 'America/Chicago' },
  on: '2027-04-06',
  now: '2027-04-06T11:20:00.000Z',
  summary: 'One child.',
  suggestion: null,
  rooms: [
    { id: 1, name: 'Room 1', opensAt: null, says: 'Free.' },
    { id: 2, name: 'Room 2', opensAt: null, says: 'Free.' },
  ],
  rows,
  otherDays: [],
  protocolSays: '',
  laboratorySays: '',
  ...more,
});
