import * as z from 'zod';
import { day, id, instant, optionalText, shortText, version } from './common';
import { explanation } from './explanation';

export const testKind = z.enum(['smear', 'amplification', 'culture']);
export type TestKind = z.infer<typeof testKind>;
export const smearValue = z.enum(['negative', 'positive']);
export const amplificationValue = z.enum(['not-detected', 'detected', 'trace', 'invalid']);
export const cultureValue = z.enum([
  'no-growth-yet',
  'negative-final',
  'growing',
  'contaminated',
  'mtb-complex',
  'not-tuberculous',
]);
export const finality = z.enum(['preliminary', 'final']);

export const result = z.object({
  id,
  test: testKind,
  value: z.string(),
  says: z.string(),
  finality,
  reportedOn: day,
  enteredAt: instant,
  enteredBy: z.string(),
  needsSecondLook: z.boolean(),
  secondLookBy: z.string().nullable(),
  isCritical: z.boolean(),
});
export type Result = z.infer<typeof result>;

export const specimen = z.object({
  id,
  version,
  seriesId: id,
  childId: id,
  childName: z.string(),
  bornOn: day,
  number: z.number().int(),
  ofPlanned: z.number().int(),
  label: z.string().nullable(),
  volumeMl: z.number(),
  collectedAt: instant,
  neutralisedAt: instant.nullable(),
  neutralisedWith: z.string().nullable(),
  neutraliseBy: instant,
  handedOverAt: instant.nullable(),
  receiptBy: instant,
  receivedAt: instant.nullable(),
  laboratoryNumber: z.string().nullable(),
  rejectedAt: instant.nullable(),
  rejectReason: z.string().nullable(),
  /** 'Neutralise within 12 minutes', 'Waiting for the courier', 'Culture final expected on ...'. */
  says: z.string(),
  isLate: z.boolean(),
  finalExpectedOn: day.nullable(),
  isOverdue: z.boolean(),
  /** How each clock and each due day was reached. */
  explains: z.array(explanation),
  /** Null where the reader may not see results. */
  results: z.array(result).nullable(),
});
export type Specimen = z.infer<typeof specimen>;
export const specimenList = z.object({
  specimens: z.array(specimen),
  laboratorySays: z.string(),
});
export type SpecimenList = z.infer<typeof specimenList>;

export const specimenStepRequest = z.discriminatedUnion('step', [
  z.object({
    step: z.literal('neutralised'),
    version,
    at: instant,
    with: shortText(80),
  }),
  z.object({ step: z.literal('labelled'), version, label: shortText(40) }),
  z.object({ step: z.literal('handed-over'), version, at: instant }),
  z.object({
    step: z.literal('received'),
    version,
    at: instant,
    laboratoryNumber: optionalText(40),
  }),
  z.object({ step: z.literal('rejected'), version, at: instant, reason: shortText(200) }),
]);
export type SpecimenStepRequest = z.input<typeof specimenStepRequest>;
export const specimenChanged = z.object({ specimen, warnings: z.array(z.string()) });
export type SpecimenChanged = z.infer<typeof specimenChanged>;

const entered = {
  reportedOn: day,
  finality,
  /** Required when a result that was already final is entered again. */
  correctionReason: optionalText(300),
};
export const enterResultRequest = z.discriminatedUnion('test', [
  z.object({ test: z.literal('smear'), value: smearValue, ...entered }),
  z.object({ test: z.literal('amplification'), value: amplificationValue, ...entered }),
  z.object({ test: z.literal('culture'), value: cultureValue, ...entered }),
]);
export type EnterResultRequest = z.input<typeof enterResultRequest>;
export const resultList = z.object({
  /** Series with results or waiting for them; most dangerous first. */
  series: z.array(
    z.object({
      seriesId: id,
      childId: id,
      childName: z.string(),
      bornOn: day,
      says: z.string(),
      isCritical: z.boolean(),
      specimens: z.array(specimen),
    }),
  ),
  laboratorySays: z.string(),
});
export type ResultList = z.infer<typeof resultList>;
