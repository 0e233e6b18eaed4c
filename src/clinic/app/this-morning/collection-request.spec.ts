import { collectionRequestOf, emptyCollection, type CollectionValues } from './collection-request';

const around = {
  version: 5,
  now: Date.parse('2027-04-06T11:30:00.000Z'),
  zone: 'America/Chicago',
};
const requestOf = (more: Partial<CollectionValues>) =>
  collectionRequestOf(
    { ...emptyCollection, collectedTime: '06:26', volumeMl: '8', ...more },
    around,
  );

test('volume and time are enough', () => {
  expect(requestOf({})).toMatchObject({
    request: {
      version: 5,
      outcome: 'collected',
      collectedAt: '2027-04-06T11:26:00.000Z',
      volumeMl: 8,
      tubeSizeFr: null,
      label: null,
      neutralisedAt: null,
      neutralisedWith: null,
    },
  });
});

test('a decimal comma is a decimal point', () => {
  expect(requestOf({ volumeMl: '8,5' })).toMatchObject({ request: { volumeMl: 8.5 } });
});

test('neutralised now goes with what it was neutralised with', () => {
  expect(requestOf({ isNeutralised: true, neutralisedWith: 'sodium carbonate' })).toMatchObject({
    request: { neutralisedAt: '2027-04-06T11:30:00.000Z', neutralisedWith: 'sodium carbonate' },
  });
  expect(requestOf({ neutralisedWith: 'sodium carbonate' })).toMatchObject({
    request: { neutralisedAt: null, neutralisedWith: null },
  });
});

test.each<[Partial<CollectionValues>, string]>([
  [{ volumeMl: '' }, 'volumeMl'],
  [{ volumeMl: 'much' }, 'volumeMl'],
  [{ volumeMl: '0' }, 'volumeMl'],
  [{ volumeMl: '101' }, 'volumeMl'],
  [{ collectedTime: '' }, 'collectedTime'],
  [{ tries: 'a few' }, 'tries'],
  [{ isNeutralised: true }, 'neutralisedWith'],
])('%j is refused beside its field', (more, field) => {
  const answer = requestOf(more);
  expect('faults' in answer && Object.keys(answer.faults)).toEqual([field]);
});
