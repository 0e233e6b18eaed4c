import type { MorningRow } from '../../shared/contracts/this-morning';
import type { Instant } from '../../shared/domain/day';
import { laboratoryCutOffAt } from '../../shared/domain/laboratory-day';
import { specimenClocks } from '../../shared/domain/specimen-clocks';
import { ageOn } from '../../shared/domain/day';
import { answerExplained, fastExplained, planExplained } from '../fasting/explain-fast';
import { toldAtOf } from '../fasting/told-rows';
import type { StoredProfile } from '../protocols/protocols';
import type { ClinicWords } from '../wording/clinic-words';
import { fastSoFar, newestAnswer, type FastSoFar } from './fast-so-far';
import type { AdultRow, MorningFacts } from './morning-facts';
import {
  ageInWords,
  cautionSays,
  doorSays,
  escortOf,
  saidSays,
  sourceSays,
  verdictSays,
  warningsOf,
} from './morning-says';

const iso = (at: Instant | null): string | null =>
  at === null ? null : new Date(at).toISOString();
const isoOf = (at: Date | null): string | null => at?.toISOString() ?? null;

export interface RowSurroundings {
  readonly words: ClinicWords;
  readonly now: Instant;
  readonly profile: StoredProfile;
  readonly rooms: ReadonlyMap<number, string>;
  /** Full names of the day, to tell like names. */
  readonly names: readonly { readonly childId: number; readonly fullName: string }[];
}

export function morningRowOf(facts: MorningFacts, around: RowSurroundings): MorningRow {
  const { plan } = facts;
  const { now, words } = around;
  const fast = fastSoFar(facts, now);
  const escort = escortOf(facts);
  const speaker = escort ?? facts.adults[0] ?? null;
  const roomId = facts.collection?.room_id ?? plan.roomId;
  return {
    morningId: plan.morningId,
    version: plan.version,
    childId: plan.childId,
    fullName: plan.fullName,
    ageInWords: ageInWords(words, ageOn(plan.bornOn, plan.on)),
    feeding: plan.feeding,
    number: plan.number,
    ofPlanned: plan.ofPlanned,
    suns: sunsOf(facts),
    arrivalTime: plan.arrivalTime,
    arrivalAt: new Date(plan.arrivalAt).toISOString(),
    expectedAt: iso(plan.expectedAt),
    arrivedAt: iso(plan.arrivedAt),
    state: plan.state,
    room: { id: roomId, name: around.rooms.get(roomId) ?? plan.roomName },
    speaks: speaker?.speaks_language ?? '',
    needsInterpreter: speaker?.needs_interpreter === 1,
    escort: escort ? `${escort.relationship}, ${escort.full_name}` : null,
    phones: phonesOf(facts.adults, escort),
    cautions: plan.cautions.map((caution) => cautionSays(words, caution)),
    warnings: warningsOf(words, facts, likeNamesOf(plan.childId, plan.fullName, around.names)),
    said: facts.said.map((row) => ({
      at: new Date(toldAtOf(row)).toISOString(),
      source: sourceSays(words, row.source),
      says: saidSays(words, row, plan.zone),
    })),
    told: toldOf(facts),
    planStopAt: plan.plan.kind === 'standard' ? iso(plan.plan.stopAt) : null,
    verdict: fast.verdict,
    verdictSays: verdictSays(words, facts, fast, now),
    fastedMinutes: fast.fastedMinutes,
    readyAt: iso(fast.readyAt),
    ceiling: fast.ceiling,
    bar: fast.bar,
    explains: explainsOf(facts, fast, words),
    doorCheck: facts.doorCheck
      ? {
          at: facts.doorCheck.checked_at.toISOString(),
          by: facts.doorCheck.checked_by,
          says: doorSays(words, facts.doorCheck, plan.zone),
          verdict: facts.doorCheck.verdict,
        }
      : null,
    collection: facts.collection
      ? {
          begunAt: facts.collection.begun_at.toISOString(),
          begunBy: facts.collection.begun_by,
          endedAt: isoOf(facts.collection.ended_at),
          outcome: facts.collection.outcome,
        }
      : null,
    specimen: specimenOf(facts, around),
    fedAt: iso(plan.fedAt),
    leftAt: iso(plan.leftAt),
  };
}

/** The plan, the newest answer as it was weighed, and the fast as it stands. */
function explainsOf(
  { plan, said }: MorningFacts,
  fast: FastSoFar,
  words: ClinicWords,
): MorningRow['explains'] {
  const weighed = newestAnswer(said)?.explanation ?? null;
  return [
    ...planExplained(words, plan),
    ...(weighed ? [answerExplained(words, weighed)] : []),
    ...(fast.isPlanOnly ? [] : [fastExplained(words, fast.explanation, plan.zone)]),
  ];
}

function toldOf({ said }: MorningFacts): MorningRow['told'] {
  const newest = newestAnswer(said);
  if (!newest) return null;
  const { answer, last_intake_at } = newest;
  if (answer !== 'nothing' && answer !== 'sip' && answer !== 'feed')
    return { answer: 'unsure', lastIntakeAt: null };
  return { answer, lastIntakeAt: isoOf(last_intake_at) };
}

function specimenOf(
  facts: MorningFacts,
  { now, profile }: RowSurroundings,
): MorningRow['specimen'] {
  const { specimen, plan } = facts;
  if (!specimen) return null;
  const clocks = specimenClocks({
    profile,
    collectedAt: specimen.collected_at.getTime(),
    neutralisedAt: specimen.neutralised_at?.getTime() ?? null,
    pickedUpAt: specimen.handed_over_at?.getTime() ?? null,
    receivedAt: specimen.received_at?.getTime() ?? null,
    cutOffAt: laboratoryCutOffAt({ profile, on: plan.on, zone: plan.zone }),
    now,
  });
  const dueAt = (step: 'neutralise' | 'receipt'): Instant | undefined =>
    clocks.find((clock) => clock.step === step)?.dueAt;
  const receiptBy = dueAt('receipt') ?? specimen.collected_at.getTime();
  return {
    id: specimen.id,
    version: specimen.version,
    number: specimen.number,
    label: specimen.label,
    volumeMl: Number(specimen.volume_ml),
    collectedAt: specimen.collected_at.toISOString(),
    neutralisedAt: isoOf(specimen.neutralised_at),
    neutraliseBy: new Date(dueAt('neutralise') ?? receiptBy).toISOString(),
    receiptBy: new Date(receiptBy).toISOString(),
    handedOverAt: isoOf(specimen.handed_over_at),
    receivedAt: isoOf(specimen.received_at),
  };
}

/** The suns of a series: what is done, the first that is still to come, the rest, what was lost. */
export function sunsOf({
  seriesMornings,
}: Pick<MorningFacts, 'seriesMornings'>): MorningRow['suns'] {
  const nextNumber = seriesMornings.find(({ state }) => isStillToCome(state))?.number ?? null;
  return seriesMornings.map(({ number, state }) => {
    if (state === 'collected') return 'done';
    if (!isStillToCome(state)) return 'lost';
    return number === nextNumber ? 'next' : 'later';
  });
}

const isStillToCome = (state: string): boolean =>
  state === 'planned' || state === 'here' || state === 'collecting';

function phonesOf(adults: readonly AdultRow[], escort: AdultRow | null): MorningRow['phones'] {
  const ordered = [...adults].sort(
    (left, right) => Number(right.id === escort?.id) - Number(left.id === escort?.id),
  );
  return ordered.flatMap(({ full_name, relationship, phone }) =>
    phone === null ? [] : [{ name: full_name, relationship, phone }],
  );
}

/** Children of one day whose names share a first or last part, in whichever order a family writes them. */
function likeNamesOf(childId: number, fullName: string, names: RowSurroundings['names']): string[] {
  const parts = partsOf(fullName);
  return names
    .filter((other) => other.childId !== childId)
    .filter((other) =>
      partsOf(other.fullName).some((part) => parts.some((mine) => isLike(mine, part))),
    )
    .map((other) => other.fullName);
}

const partsOf = (name: string): string[] =>
  name
    .toLocaleLowerCase('en')
    .split(/[\s-]+/)
    .filter((part) => part.length >= 3);

/** Alike: the same, or one begins with the other (Samir, Samira). */
const isLike = (left: string, right: string): boolean =>
  left.startsWith(right) || right.startsWith(left);
