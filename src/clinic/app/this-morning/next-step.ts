import type { Right } from '../../../../shared/access/rights';
import type { MorningRow, ThisMorning } from '../../../../shared/contracts/this-morning';
import { clockIn } from '../../../common/ui/clinic-times';
import { begin, callsOf, offer, type Act, type Offer } from './offers';

export type { Act, Offer } from './offers';

export interface NextStep {
  /** What is missing or comes next, in words. */
  readonly says: string;
  readonly offers: readonly Offer[];
  readonly more: readonly Offer[];
  /** The first this many offers are filled when the row is the suggested one; a pair weighs the same. */
  readonly filled: number;
  readonly isPair: boolean;
}

export interface Surroundings {
  /** Epoch milliseconds. */
  readonly now: number;
  readonly zone: string;
  readonly rooms: readonly RoomNow[];
  readonly suggestion: ThisMorning['suggestion'];
  readonly has: (right: Right) => boolean;
}

export interface RoomNow {
  readonly id: number;
  readonly name: string;
  readonly isFree: boolean;
}

const rightsOfActs: Readonly<Record<Act, Right>> = {
  arrive: 'arrivals.write',
  'door-check': 'door-check.write',
  begin: 'collections.write',
  'go-on': 'orders.sign',
  collected: 'collections.write',
  'not-collected': 'collections.write',
  feed: 'mornings.run',
  left: 'mornings.run',
  neutralise: 'specimens.write',
  label: 'specimens.write',
  call: 'mornings.read',
};

/** Which room is free: not closed for its air, and nobody inside. */
export function roomsNow({ rooms, rows }: Pick<ThisMorning, 'rooms' | 'rows'>): RoomNow[] {
  return rooms.map(({ id, name, opensAt }) => ({
    id,
    name,
    isFree:
      opensAt === null && !rows.some((row) => row.state === 'collecting' && row.room.id === id),
  }));
}

const none: Omit<NextStep, 'says'> = { offers: [], more: [], filled: 0, isPair: false };

/** What a row offers now; the client only hides, the server decides. */
export function nextStep(row: MorningRow, around: Surroundings): NextStep {
  const step = stepOf(row, around);
  const allowed = (offer: Offer): boolean => around.has(rightsOfActs[offer.act]);
  return { ...step, offers: step.offers.filter(allowed), more: step.more.filter(allowed) };
}

function stepOf(row: MorningRow, around: Surroundings): NextStep {
  switch (row.state) {
    case 'planned':
      return stepBeforeArrival(row);
    case 'here':
      return stepHere(row, around);
    case 'collecting':
      return {
        ...none,
        says: $localize`:@@clinic.this-morning.in-room:In ${row.room.name}:room:.`,
        offers: [offer('collected'), offer('not-collected')],
        filled: 1,
      };
    case 'collected':
      return stepAfter(row, around);
    case 'not-collected':
      return stepHome(row);
    case 'lost':
      return { ...none, says: '' };
  }
}

function stepBeforeArrival(row: MorningRow): NextStep {
  const calls = callsOf(row);
  const isUnclear = row.verdict === 'cannot-tell';
  if (row.said.length > 0 && !isUnclear)
    return {
      ...none,
      says: $localize`:@@clinic.this-morning.missing-door-check:Missing: door check.`,
      offers: [offer('arrive')],
      more: calls,
      filled: 1,
    };
  const [first, ...others] = calls;
  return {
    ...none,
    says: isUnclear
      ? $localize`:@@clinic.this-morning.ask-again:Ask again: nobody can tell yet.`
      : $localize`:@@clinic.this-morning.no-answer:No answer yet.`,
    offers: [...(first ? [first] : []), offer('arrive')],
    more: others,
  };
}

function stepHere(row: MorningRow, { now, zone, rooms, suggestion }: Surroundings): NextStep {
  const again = offer('door-check', $localize`:@@clinic.this-morning.check-again:Check again`);
  if (row.fedAt !== null) return { ...stepHome(row), more: [again, ...callsOf(row)] };
  if (row.doorCheck === null)
    return {
      ...none,
      says:
        row.ceiling === 'ok'
          ? $localize`:@@clinic.this-morning.missing-door-check:Missing: door check.`
          : $localize`:@@clinic.this-morning.check-or-feed:Check at the door now, or feed.`,
      offers: row.ceiling === 'ok' ? [offer('door-check')] : [offer('door-check'), offer('feed')],
      more: row.ceiling === 'ok' ? [offer('feed')] : [],
      filled: 1,
    };
  const room = roomFor(row, rooms, suggestion);
  const begins = rooms.filter(({ id }) => id !== room.id).map((other) => begin(other));
  if (row.ceiling !== 'ok') return stepAtCeiling(row, { room, begins, again, zone });
  const readyAt = row.readyAt === null ? null : Date.parse(row.readyAt);
  if (readyAt !== null && readyAt > now)
    return {
      ...none,
      says: $localize`:@@clinic.this-morning.wait-until:Wait until ${clockIn(row.readyAt ?? '', zone)}:time:.`,
      more: [again, offer('feed')],
    };
  return {
    ...none,
    says: room.isFree
      ? ''
      : $localize`:@@clinic.this-morning.room-not-free:${room.name}:room: is not free yet.`,
    offers: [begin(room)],
    more: [...begins, again, offer('feed')],
    filled: 1,
  };
}

interface AtCeiling {
  readonly room: RoomNow;
  readonly begins: readonly Offer[];
  readonly again: Offer;
  readonly zone: string;
}

/** Two choices of the same weight; past the longest fast going on needs a clinician and a reason. */
function stepAtCeiling(row: MorningRow, { room, begins, again, zone }: AtCeiling): NextStep {
  const feed = {
    ...offer('feed', $localize`:@@clinic.this-morning.feed-now:Feed now`),
    leadsTo: $localize`:@@clinic.this-morning.plan-again:plan again`,
  };
  const limit = row.bar === null ? '' : clockIn(row.bar.longestAt, zone);
  if (row.ceiling === 'feed')
    return {
      says: $localize`:@@clinic.this-morning.longest-passed:The longest fast has passed: feed. Going on needs a clinician and a reason.`,
      offers: [
        feed,
        {
          ...offer('go-on'),
          leadsTo: $localize`:@@clinic.this-morning.with-reason:with a clinician’s reason`,
          roomId: room.id,
        },
      ],
      more: [begin(room), ...begins, again],
      filled: 1,
      isPair: true,
    };
  return {
    says: $localize`:@@clinic.this-morning.collect-or-feed:Collect now, or feed by ${limit}:time:.`,
    offers: [
      {
        ...begin(room, $localize`:@@clinic.this-morning.collect-now:Collect now`),
        leadsTo: room.isFree
          ? $localize`:@@clinic.this-morning.room-free:${room.name}:room: is free`
          : $localize`:@@clinic.this-morning.in-that-room:in ${room.name}:room:`,
      },
      feed,
    ],
    more: [...begins, again],
    filled: 2,
    isPair: true,
  };
}

function stepAfter(row: MorningRow, { now }: Surroundings): NextStep {
  const { specimen } = row;
  if (specimen === null) return stepHome(row);
  const home = stepHome(row);
  const labels = specimen.label === null ? [offer('label')] : [];
  if (specimen.neutralisedAt !== null) {
    if (labels.length === 0) return home;
    return {
      ...none,
      says: $localize`:@@clinic.this-morning.missing-label:Missing: the label.`,
      offers: [...labels, ...home.offers],
      filled: 1,
    };
  }
  const minutes = Math.round((Date.parse(specimen.neutraliseBy) - now) / 60_000);
  return {
    ...none,
    says:
      minutes >= 0
        ? $localize`:@@clinic.this-morning.neutralise-in:Neutralise: ${minutes}:minutes: min left.`
        : $localize`:@@clinic.this-morning.neutralise-late:Neutralise now: ${-minutes}:minutes: min late.`,
    offers: [offer('neutralise'), ...home.offers],
    more: labels,
    filled: 1,
  };
}

/** Food, then home. */
function stepHome(row: MorningRow): NextStep {
  if (row.leftAt !== null)
    return { ...none, says: $localize`:@@clinic.this-morning.gone:Gone home.` };
  if (row.fedAt === null)
    return {
      ...none,
      says: $localize`:@@clinic.this-morning.missing-food:Missing: food.`,
      offers: [offer('feed', $localize`:@@clinic.this-morning.fed:Fed`)],
      more: [offer('left')],
      filled: 1,
    };
  return {
    ...none,
    says: $localize`:@@clinic.this-morning.fed-says:Fed.`,
    offers: [offer('left')],
    filled: 1,
  };
}

/** The suggested room, else the planned one when it is free, else the first free one. */
function roomFor(
  row: MorningRow,
  rooms: readonly RoomNow[],
  suggestion: ThisMorning['suggestion'],
): RoomNow {
  const suggested =
    suggestion?.morningId === row.morningId
      ? rooms.find(({ id }) => id === suggestion.roomId)
      : undefined;
  const planned = rooms.find(({ id }) => id === row.room.id);
  const free = planned?.isFree ? planned : rooms.find(({ isFree }) => isFree);
  return suggested ?? free ?? planned ?? { ...row.room, isFree: false };
}
