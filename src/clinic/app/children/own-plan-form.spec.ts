import { individualPlanBody } from '../../../../shared/contracts/individual-plans';
import { emptyMedicine, fieldOfPath, ownPlanBody, ownPlanFields } from './own-plan-form';

const filled = () => {
  const fields = ownPlanFields();
  fields.stops['breast-milk'] = { hours: '3,5', from: '' };
  fields.stops['tube-feed'] = { hours: '', from: '02:30' };
  fields.longestHours = '6';
  fields.phrases['glucose-low-feed-and-call'] = true;
  fields.glucoseMgDl = '70';
  fields.medicines = [
    { ...emptyMedicine, name: 'Zinc', time: '06:00', sipMl: '5' },
    { name: 'Levetiracetam', way: 'usual-time-with-sip', time: '06:00', sipMl: '5' },
  ];
  return fields;
};

test('empty fields say nothing, and no hour is suggested', () => {
  const body = ownPlanBody(ownPlanFields());
  expect(body).toEqual({
    stops: [],
    longestHours: 0,
    lastFeedTime: null,
    phrases: [],
    medicines: [],
  });
  expect(individualPlanBody.safeParse(body).success).toBe(false);
});

test('what is filled in is sent, times and water only with a sip', () => {
  expect(individualPlanBody.parse(ownPlanBody(filled()))).toEqual({
    stops: [
      { item: 'breast-milk', leastHours: 3.5, nothingFrom: null },
      { item: 'tube-feed', leastHours: null, nothingFrom: '02:30' },
    ],
    longestHours: 6,
    lastFeedTime: null,
    phrases: [{ key: 'glucose-low-feed-and-call', glucoseMgDl: 70 }],
    medicines: [
      { name: 'Zinc', way: 'after-the-test', time: null, sipMl: null },
      { name: 'Levetiracetam', way: 'usual-time-with-sip', time: '06:00', sipMl: 5 },
    ],
  });
});

test('a version opens in the form as it was signed', () => {
  const body = individualPlanBody.parse(ownPlanBody(filled()));
  expect(ownPlanBody(ownPlanFields(body))).toEqual(body);
});

test.each([
  ['body.stops.1.leastHours', 'stops.tube-feed'],
  ['stops', 'stops.solid-food'],
  ['body.longestHours', 'longestHours'],
  ['phrases.0.glucoseMgDl', 'glucoseMgDl'],
  ['body.medicines.1.sipMl', 'medicines.1'],
])('%s is said beside %s', (path, field) => {
  expect(fieldOfPath(path, ownPlanBody(filled()))).toBe(field);
});
