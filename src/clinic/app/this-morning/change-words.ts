import type { MorningRow } from '../../../../shared/contracts/this-morning';
import { clockIn } from '../../../common/ui/clinic-times';

/** Who changed what between two states of a row, in one sentence; null when nothing that matters did. */
export function changeWords(before: MorningRow, after: MorningRow, zone: string): string | null {
  if (before.version === after.version && before.said.length === after.said.length) {
    const isSame =
      before.specimen?.version === after.specimen?.version &&
      before.expectedAt === after.expectedAt;
    if (isSame) return null;
  }
  return sentences(before, after, zone).find((sentence) => sentence !== null) ?? null;
}

function sentences(before: MorningRow, after: MorningRow, zone: string): (string | null)[] {
  const name = after.fullName;
  const clock = (at: string | null): string => (at === null ? '' : clockIn(at, zone));
  const { collection, doorCheck, specimen } = after;
  const said = after.said.at(-1);
  return [
    before.leftAt === null && after.leftAt !== null
      ? $localize`:@@clinic.change.left:${name}:name: went home at ${clock(after.leftAt)}:time:.`
      : null,
    before.fedAt === null && after.fedAt !== null
      ? $localize`:@@clinic.change.fed:${name}:name: was fed at ${clock(after.fedAt)}:time:.`
      : null,
    specimen?.neutralisedAt && !before.specimen?.neutralisedAt
      ? $localize`:@@clinic.change.neutralised:The specimen of ${name}:name: was neutralised at ${clock(specimen.neutralisedAt)}:time:.`
      : null,
    specimen !== null && before.specimen === null
      ? $localize`:@@clinic.change.collected:${name}:name:: collected at ${clock(specimen.collectedAt)}:time:.`
      : null,
    after.state === 'not-collected' && before.state !== 'not-collected'
      ? $localize`:@@clinic.change.not-collected:${name}:name:: not collected.`
      : null,
    collection !== null && before.collection === null
      ? $localize`:@@clinic.change.begun:${collection.begunBy}:who: began with ${name}:name: at ${clock(collection.begunAt)}:time:.`
      : null,
    doorCheck !== null && doorCheck.at !== before.doorCheck?.at
      ? $localize`:@@clinic.change.door:${doorCheck.by}:who: checked ${name}:name: at the door at ${clock(doorCheck.at)}:time:. ${doorCheck.says}:says:`
      : null,
    before.arrivedAt === null && after.arrivedAt !== null
      ? $localize`:@@clinic.change.arrived:${name}:name: is here since ${clock(after.arrivedAt)}:time:.`
      : null,
    said !== undefined && after.said.length > before.said.length
      ? $localize`:@@clinic.change.said:The family of ${name}:name: said at ${clock(said.at)}:time:: ${said.says}:says:`
      : null,
    $localize`:@@clinic.change.other:Somebody changed the row of ${name}:name:.`,
  ];
}
