import { holdingAt, skyOf } from './sky-of';

const at = (text: string) => Date.parse(text);
const moments = [
  { from: '2027-04-13T23:00:00.000Z', says: 'supper' },
  { from: '2027-04-14T05:00:00.000Z', says: 'nothing more' },
  { from: '2027-04-14T09:00:00.000Z', says: 'answer' },
];

describe('what holds now', () => {
  it.each([
    ['2027-04-13T10:00:00.000Z', 'supper'],
    ['2027-04-13T23:00:00.000Z', 'supper'],
    ['2027-04-14T04:59:59.999Z', 'supper'],
    ['2027-04-14T05:00:00.000Z', 'nothing more'],
    ['2027-04-15T05:00:00.000Z', 'answer'],
  ])('at %s it is %s', (now, says) => {
    expect(holdingAt(moments, at(now))?.says).toBe(says);
  });

  it('does not depend on the order in which they were sent', () => {
    expect(holdingAt([...moments].reverse(), at('2027-04-14T06:00:00.000Z'))?.says).toBe(
      'nothing more',
    );
  });

  it('takes the later of two with one instant', () => {
    const twice = [moments[0], { from: '2027-04-13T23:00:00.000Z', says: 'second' }].filter(
      (entry) => entry !== undefined,
    );
    expect(holdingAt(twice, at('2027-04-13T23:30:00.000Z'))?.says).toBe('second');
  });

  it('is nothing when nothing was sent', () => {
    expect(skyOf([], at('2027-04-13T23:30:00.000Z'))).toBeNull();
  });
});
