import type { ProtocolValues } from '../../../../../shared/contracts/protocols';
import { startingProtocol } from '../../../../../shared/domain/fasting-protocol';
import { validateProtocol } from '../../../../../shared/domain/fasting-protocol-problems';
import {
  alignBands,
  everythingOf,
  protocolForm,
  protocolValues,
  removeBand,
  setEverything,
  splitBand,
} from './protocol-form';

const starting: ProtocolValues = {
  title: 'Ours',
  effectiveOn: '2027-04-14',
  usualWaitMinutes: 30,
  eatAgainAfterMinutes: 15,
  wakeToCollectionMinutes: null,
  allowedItems: ['pacifier'],
  individualPlanCautions: [...startingProtocol.individualPlanCautions],
  bands: startingProtocol.bands.map((band) => ({
    ...band,
    leastHours: band.leastHours ? { ...band.leastHours } : null,
  })),
};

const ages = (values: ProtocolValues): string[] =>
  values.bands.map(({ fromMonths, toMonths }) => `${fromMonths}-${toMonths ?? ''}`);
/** Whatever is done to the rows, no age is left out and none stands twice. */
const seams = (values: ProtocolValues): string[] =>
  validateProtocol({ ...startingProtocol, bands: values.bands })
    .map(({ code }) => code)
    .filter((code) => code === 'gap' || code === 'overlap' || code === 'not-to-the-end');

it('holds a version as it came', () => {
  expect(protocolValues(protocolForm(starting))).toEqual(starting);
});

it('shows one number for everything by mouth, and none where the items differ', () => {
  const { bands } = protocolForm(starting).controls;
  const toddler = bands.at(3);
  expect(everythingOf(toddler)).toBe(6);
  toddler.controls.leastHours.controls.water.setValue(2);
  expect(everythingOf(toddler)).toBeNull();
  setEverything(toddler, 7);
  expect(new Set(Object.values(toddler.controls.leastHours.getRawValue()))).toEqual(new Set([7]));
});

it('splits a band in the middle, with the same hours', () => {
  const form = protocolForm(starting);
  splitBand(form.controls.bands, 4);
  const values = protocolValues(form);
  expect(ages(values).slice(4, 6)).toEqual(['24-41', '42-59']);
  expect(values.bands[5]?.leastHours).toEqual(values.bands[4]?.leastHours);
  expect(seams(values)).toEqual([]);
});

it('cuts a band without an end after a year', () => {
  const form = protocolForm(starting);
  splitBand(form.controls.bands, 5);
  expect(ages(protocolValues(form)).slice(5)).toEqual(['60-71', '72-']);
});

it('gives the ages of a removed band to its neighbour', () => {
  const form = protocolForm(starting);
  removeBand(form.controls.bands, 5);
  expect(ages(protocolValues(form)).slice(-1)).toEqual(['24-']);
  removeBand(form.controls.bands, 0);
  expect(ages(protocolValues(form))[0]).toBe('0-5');
  expect(seams(protocolValues(form))).toEqual([]);
});

it('moves the next band when an age is typed', () => {
  const form = protocolForm(starting);
  form.controls.bands.at(2).controls.toMonths.setValue(8);
  alignBands(form.controls.bands);
  expect(ages(protocolValues(form)).slice(2, 4)).toEqual(['6-8', '9-23']);
});

it('sends emptied hours as none, and an emptied number of minutes as no number', () => {
  const form = protocolForm(starting);
  form.controls.bands.at(3).controls.leastHours.controls.water.setValue(null);
  form.controls.usualWaitMinutes.setValue(null);
  const sent = JSON.parse(JSON.stringify(protocolValues(form))) as ProtocolValues;
  expect(sent.bands[3]?.leastHours?.water).toBe(0);
  expect(sent.usualWaitMinutes).toBeNull();
});
