import {
  endCollectionRequest,
  type EndCollectionRequest,
} from '../../../../shared/contracts/this-morning';
import type { Instant } from '../../../../shared/domain/zone';
import { doorTime } from './door-time';
import { schemaSentence } from '../../../common/ui/form/schema-sentences';

/** What the form holds, as typed. */
export interface CollectionValues {
  readonly collectedTime: string;
  readonly volumeMl: string;
  readonly tubeSizeFr: string;
  readonly positionCheck: string;
  readonly rinseFluid: string;
  readonly rinseMl: string;
  readonly tries: string;
  readonly tolerance: string;
  readonly label: string;
  readonly isNeutralised: boolean;
  readonly neutralisedWith: string;
}

export const emptyCollection: CollectionValues = {
  collectedTime: '',
  volumeMl: '',
  tubeSizeFr: '',
  positionCheck: '',
  rinseFluid: '',
  rinseMl: '',
  tries: '',
  tolerance: '',
  label: '',
  isNeutralised: false,
  neutralisedWith: '',
};

const fieldNames: Readonly<Record<string, string>> = {
  collectedAt: 'collectedTime',
  neutralisedAt: 'isNeutralised',
};
/** The form's field that a request's path belongs to. */
export const collectionFieldOf = (path: string): string => fieldNames[path] ?? path;

/** '8,5' and '8.5' are the same; null for nothing, NaN for anything else. */
const number = (text: string): number | null =>
  text.trim() === '' ? null : Number(text.trim().replace(',', '.'));

/** The request, or what is wrong beside each field. */
export function collectionRequestOf(
  values: CollectionValues,
  around: { readonly version: number; readonly now: Instant; readonly zone: string },
):
  | { readonly request: EndCollectionRequest }
  | { readonly faults: Readonly<Record<string, string>> } {
  const faults: Record<string, string> = {};
  const read = doorTime(values.collectedTime, around.now, around.zone);
  const collectedAt = read === null ? null : read.kind === 'once' ? read.at : read.later;
  if (collectedAt === null)
    faults['collectedTime'] =
      $localize`:@@clinic.door.clock-time:Give a time between 00:00 and 23:59.`;
  const volumeMl = number(values.volumeMl);
  if (volumeMl === null)
    faults['volumeMl'] = $localize`:@@clinic.collection.give-volume:Give the volume in mL.`;
  for (const field of ['volumeMl', 'tubeSizeFr', 'rinseMl', 'tries'] as const)
    if (Number.isNaN(number(values[field])))
      faults[field] = $localize`:@@clinic.collection.give-number:Give a number.`;
  if (values.isNeutralised && values.neutralisedWith.trim() === '')
    faults['neutralisedWith'] =
      $localize`:@@clinic.collection.give-agent:Say with what it was neutralised.`;
  if (Object.keys(faults).length > 0 || collectedAt === null) return { faults };
  const parsed = endCollectionRequest.safeParse({
    version: around.version,
    outcome: 'collected',
    collectedAt: new Date(collectedAt).toISOString(),
    volumeMl,
    tubeSizeFr: number(values.tubeSizeFr),
    positionCheck: values.positionCheck,
    rinseFluid: values.rinseFluid,
    rinseMl: number(values.rinseMl),
    tries: number(values.tries),
    tolerance: values.tolerance,
    label: values.label,
    neutralisedAt: values.isNeutralised
      ? new Date(Math.max(around.now, collectedAt)).toISOString()
      : null,
    neutralisedWith: values.isNeutralised ? values.neutralisedWith : null,
  });
  if (parsed.success) return { request: parsed.data };
  return {
    faults: Object.fromEntries(
      parsed.error.issues.map((issue) => [
        collectionFieldOf(String(issue.path[0])),
        schemaSentence(issue.message),
      ]),
    ),
  };
}
