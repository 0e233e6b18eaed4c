import type { NextMorning, PathStep } from '../../../../shared/contracts/family-morning';
import { pathParts, stepsPast, timeLeft, type NowRow, type StepRow } from './path-rows';

const child = (childId: number): NextMorning['children'][number] => ({
  childId,
  morningId: childId + 10,
  callMe: `Child ${childId}`,
  face: 'toddler',
  headSays: '',
  stopAt: null,
  individualPlanSays: null,
});

const step = (
  key: string,
  part: PathStep['part'],
  at: string,
  mouths: [PathStep['mouths'][number]['mouth'], PathStep['mouths'][number]['mouth']],
  childIds: number[],
): PathStep => ({
  key,
  part,
  time: { at, clock: '', dayPart: '' },
  isAbout: false,
  isLoud: false,
  title: key,
  lines: [],
  pictures: [],
  childIds,
  mouths: mouths.map((mouth, index) => ({ childId: index + 1, mouth })),
});

const morning = {
  children: [child(1), child(2)],
  parts: [{ part: 'night' as const, says: 'Night from Tuesday to Wednesday' }],
  steps: [
    step('supper', 'evening', '2027-04-13T22:00:00.000Z', ['starts', 'starts'], [1, 2]),
    step('stop-1', 'night', '2027-04-14T05:00:00.000Z', ['ends', 'full'], [1]),
    step('feed-2', 'night', '2027-04-14T06:20:00.000Z', ['empty', 'full'], [2]),
    step('stop-2', 'night', '2027-04-14T07:00:00.000Z', ['empty', 'ends'], [2]),
    step('arrive', 'morning', '2027-04-14T11:00:00.000Z', ['empty', 'empty'], [1, 2]),
    step('eat-2', 'morning', '2027-04-14T11:30:00.000Z', ['empty', 'begins'], [2]),
  ],
};

const rowsAt = (now: string) =>
  pathParts(morning, Date.parse(now)).flatMap((part) => part.rows.map((row) => row.key));
const stepRow = (key: string) =>
  pathParts(morning, 0)
    .flatMap((part) => part.rows)
    .find((row): row is StepRow => row.kind === 'step' && row.key === key);

describe('now on the night path', () => {
  it('is not on the path before the first step has come', () => {
    expect(rowsAt('2027-04-13T21:59:59.000Z')).not.toContain('now');
  });

  it.each([
    ['2027-04-13T22:00:00.000Z', 'stop-1'],
    ['2027-04-14T04:59:59.000Z', 'stop-1'],
    ['2027-04-14T05:00:00.000Z', 'feed-2'],
    ['2027-04-14T10:59:00.000Z', 'arrive'],
    ['2027-04-14T11:00:00.000Z', 'eat-2'],
  ])('at %s stands before %s', (now, key) => {
    const rows = rowsAt(now);
    expect(rows[rows.indexOf('now') + 1]).toBe(key);
  });

  it('is over when the last step has come', () => {
    expect(rowsAt('2027-04-14T11:30:00.000Z')).not.toContain('now');
    expect(stepsPast(morning.steps, Date.parse('2027-04-14T11:30:00.000Z'))).toBe(6);
  });

  it('draws the lanes across the flag as the step before left them', () => {
    const now = pathParts(morning, Date.parse('2027-04-14T05:10:00.000Z'))
      .flatMap((part) => part.rows)
      .find((row): row is NowRow => row.kind === 'now');
    expect(now?.lanes.map(({ mouth }) => mouth)).toEqual(['empty', 'full']);
  });
});

describe('lanes of a step', () => {
  it('shows the face of the child whose mouth changes, or whose step it is', () => {
    expect(stepRow('stop-1')?.lanes.map(({ face }) => face)).toEqual(['toddler', null]);
    expect(stepRow('feed-2')?.lanes.map(({ face }) => face)).toEqual([null, 'toddler']);
  });

  it('clasps all lanes when the step is everyone’s', () => {
    expect(stepRow('arrive')?.isTied).toBe(true);
    expect(stepRow('arrive')?.lanes.every(({ face }) => face === null)).toBe(true);
    expect(stepRow('stop-2')?.isTied).toBe(false);
  });

  it('ends the lanes at the last step only', () => {
    expect(stepRow('eat-2')?.lanes.every(({ isLast }) => isLast)).toBe(true);
    expect(stepRow('arrive')?.lanes.some(({ isLast }) => isLast)).toBe(false);
  });

  it('groups the steps by the part of the night, with its heading', () => {
    expect(pathParts(morning, 0).map(({ part, says }) => [part, says])).toEqual([
      ['evening', ''],
      ['night', 'Night from Tuesday to Wednesday'],
      ['morning', ''],
    ]);
  });
});

describe('what is left of the time to eat', () => {
  it.each([
    ['2027-04-13T23:40:00.000Z', { hours: 5, minutes: 20 }],
    ['2027-04-14T04:59:01.000Z', null],
    ['2027-04-14T04:59:00.000Z', { hours: 0, minutes: 1 }],
    ['2027-04-14T05:00:00.000Z', null],
    ['2027-04-14T06:00:00.000Z', null],
  ])('at %s is %j', (now, left) => {
    expect(timeLeft('2027-04-14T05:00:00.000Z', Date.parse(now))).toEqual(left);
  });
});
