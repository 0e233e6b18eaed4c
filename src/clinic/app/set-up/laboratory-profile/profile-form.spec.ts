import type { ProfileValues } from '../../../../../shared/contracts/protocols';
import { demoLaboratoryProfile } from '../../../../../shared/domain/specimen-clocks';
import { profileForm, profileValues } from './profile-form';

const values: ProfileValues = {
  name: 'Harbor Street laboratory',
  effectiveOn: '2027-04-14',
  receivingWeekdays: [1, 2, 3, 4, 5],
  receivingFromTimes: { '1': '07:00' },
  cutOffTimes: { '1': '11:30', '2': '11:30', '3': '11:30', '4': '11:30', '5': '11:30' },
  minutesToLaboratory: 40,
  neutraliseWithinMinutes: 30,
  receiptWithinMinutes: 240,
  minimumVolumeMl: 5,
  maximumVolumeMl: 15,
  resultDays: { ...demoLaboratoryProfile.resultDays },
};

it('holds a version as it came', () => {
  expect(profileValues(profileForm(values))).toEqual(values);
});

it('leaves out the times of a day on which nobody receives', () => {
  const form = profileForm(values);
  form.controls.days.controls['1'].controls.receives.setValue(false);
  const { receivingWeekdays, receivingFromTimes, cutOffTimes } = profileValues(form);
  expect(receivingWeekdays).toEqual([2, 3, 4, 5]);
  expect(receivingFromTimes).toEqual({});
  expect(Object.keys(cutOffTimes)).toEqual(['2', '3', '4', '5']);
});

it('sends a laboratory that neutralises itself as such, and an emptied number as no number', () => {
  const form = profileForm(values);
  form.controls.neutraliseWithinMinutes.setValue(null);
  form.controls.resultDays.controls.smear.setValue(null);
  const sent = JSON.parse(JSON.stringify(profileValues(form))) as ProfileValues;
  expect(sent.neutraliseWithinMinutes).toBeNull();
  expect(sent.resultDays.smear).toBeNull();
});
