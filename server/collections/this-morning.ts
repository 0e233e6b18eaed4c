import type { MorningRow, ThisMorning } from '../../shared/contracts/this-morning';
import type { Day, Instant } from '../../shared/domain/day';
import { nextChild } from '../../shared/domain/order-of-morning';
import { addDays, dayOf } from '../../shared/domain/zone';
import type { Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { childIdsInReach } from '../children/reach';
import type { Context } from '../context';
import { select } from '../database/connection';
import { laboratoryProfileOf, type StoredProfile } from '../protocols/protocols';
import { roomsOf, siteOf, type Site, type SiteRoom } from '../sites/sites';
import { minutesInWords } from '../wording/clinic-measures';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { fastSoFar } from './fast-so-far';
import { morningFactsOf, type MorningFacts } from './morning-facts';
import { morningRowOf } from './morning-row';
import { orderExplained } from '../fasting/explain-fast';
import { reasonSays, suggestionSays, summarySays } from './morning-says';
import { recordViewOnce } from '../access-record/record-view-once';

/** The sheet of a day at the staff member's site, in order of arrival; no results anywhere on it. */
export async function thisMorning(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  wantedOn?: Day,
): Promise<ThisMorning> {
  const { db } = context;
  const now = context.clock.now();
  const site = await siteOf(db, staff.siteId);
  const on = wantedOn ?? dayOf(now, site.zone);
  const words = clinicWords(staff.language);
  const whole = await sheetOf(context, site, on, now, words);
  const reached = await childIdsInReach(
    db,
    staff,
    whole.rows.map(({ childId }) => childId),
  );
  const isReached = ({ childId }: { readonly childId: number }): boolean => reached.has(childId);
  const sheet = {
    ...whole,
    facts: whole.facts.filter(({ plan }) => isReached(plan)),
    rows: whole.rows.filter(isReached),
  };
  const otherDays = await select<{ on: Day }>(
    db,
    `SELECT DISTINCT planned_on AS \`on\` FROM mornings
     WHERE site_id = :siteId AND planned_on BETWEEN :from AND :until AND planned_on <> :on ORDER BY planned_on`,
    { siteId: site.id, from: addDays(on, -14), until: addDays(on, 14), on },
  );
  await recordViewOnce(context, actor, {
    matter: 'this-morning',
    childIds: sheet.facts.map(({ plan }) => plan.childId),
    detail: { on },
    at: now,
  });
  return {
    site: { id: site.id, name: site.name, door: site.door, zone: site.zone },
    on,
    now: new Date(now).toISOString(),
    summary: summaryOf(words, sheet.rows),
    suggestion: sheet.rows.length === whole.rows.length ? suggestionOf(words, whole, now) : null,
    // A room is in use by whichever child; the name is for those who may open its record.
    rooms: whole.rooms.map((room) => roomState(words, room, whole, now, isReached)),
    rows: sheet.rows,
    otherDays: otherDays.map((other) => other.on),
    protocolSays: [...new Set(sheet.facts.map(({ plan }) => plan.protocol.says))]
      .map((says) => words.text('clinic.morning.hours', { says: words.sentence(says) }))
      .join(' '),
    laboratorySays: sheet.profile
      ? words.text('clinic.morning.clocks', { says: words.sentence(sheet.profile.says) })
      : '',
  };
}

export interface Sheet {
  readonly site: Site;
  readonly facts: readonly MorningFacts[];
  readonly rows: MorningRow[];
  readonly rooms: readonly SiteRoom[];
  readonly profile: StoredProfile | null;
}

export async function sheetOf(
  context: Context,
  site: Site,
  on: Day,
  now: Instant,
  words: ClinicWords,
): Promise<Sheet> {
  const { db } = context;
  const [facts, rooms] = await Promise.all([morningFactsOf(db, site.id, on), roomsOf(db, site.id)]);
  const profileIds = [...new Set(facts.map(({ plan }) => plan.laboratoryProfileId))];
  const profiles = new Map(
    await Promise.all(
      profileIds.map(async (id) => [id, await laboratoryProfileOf(db, id)] as const),
    ),
  );
  const roomNames = new Map(rooms.map((room) => [room.id, room.name]));
  const names = facts.map(({ plan }) => ({ childId: plan.childId, fullName: plan.fullName }));
  const rows = facts.flatMap((one) => {
    const profile = profiles.get(one.plan.laboratoryProfileId);
    return profile ? [morningRowOf(one, { words, now, profile, rooms: roomNames, names })] : [];
  });
  const [profile] = profiles.values();
  return { site, facts, rows, rooms, profile: profile ?? null };
}

function summaryOf(words: ClinicWords, rows: readonly MorningRow[]): string {
  const count = (test: (row: MorningRow) => boolean): number => rows.filter(test).length;
  return summarySays(words, {
    all: rows.length,
    collected: count(({ state }) => state === 'collected'),
    notCollected: count(({ state }) => state === 'not-collected'),
    collecting: count(({ state }) => state === 'collecting'),
    here: count(({ state }) => state === 'here'),
    onTheWay: count(({ state, said }) => state === 'planned' && said.length > 0),
    silent: count(({ state, said }) => state === 'planned' && said.length === 0),
    lost: count(({ state }) => state === 'lost'),
  });
}

/** When the room's air is clean again; null while a child is inside. */
export function roomFreeAt(room: SiteRoom, facts: readonly MorningFacts[]): Instant | null {
  const uses = facts.flatMap(({ collection }) =>
    collection?.room_id === room.id ? [collection] : [],
  );
  if (uses.some(({ ended_at }) => ended_at === null)) return null;
  const lastEnd = Math.max(0, ...uses.map(({ ended_at }) => ended_at?.getTime() ?? 0));
  return lastEnd === 0 ? 0 : lastEnd + room.closureMinutes * 60_000;
}

function roomState(
  words: ClinicWords,
  room: SiteRoom,
  sheet: Sheet,
  now: Instant,
  isReached: (plan: { readonly childId: number }) => boolean,
): ThisMorning['rooms'][number] {
  const { id, name } = room;
  const freeAt = roomFreeAt(room, sheet.facts);
  if (freeAt === null) {
    const inside = sheet.facts.find(
      ({ collection, plan }) =>
        collection?.room_id === id && collection.ended_at === null && isReached(plan),
    );
    return {
      id,
      name,
      opensAt: null,
      says: words.text('clinic.room.in-use', {
        name: inside?.plan.callMe ?? words.text('clinic.a-child'),
      }),
    };
  }
  if (freeAt <= now)
    return {
      id,
      name,
      opensAt: null,
      says: words.text('clinic.room.free', {
        minutes: minutesInWords(words, room.closureMinutes),
      }),
    };
  const minutes = Math.ceil((freeAt - now) / 60_000);
  return {
    id,
    name,
    opensAt: new Date(freeAt).toISOString(),
    says: words.text('clinic.room.closed', {
      minutes: minutesInWords(words, minutes),
      at: words.clock(freeAt, sheet.site.zone),
    }),
  };
}

function suggestionOf(words: ClinicWords, sheet: Sheet, now: Instant): ThisMorning['suggestion'] {
  const waiting = sheet.facts.filter(
    ({ plan, collection }) => plan.state === 'here' && !collection && plan.fedAt === null,
  );
  const next = nextChild({
    waiting: waiting.map((facts) => {
      const fast = fastSoFar(facts, now);
      const { plan } = facts.plan;
      return {
        childId: facts.plan.childId,
        bornOn: facts.plan.bornOn,
        bookedAt: facts.plan.arrivalAt,
        arrivedAt: facts.plan.arrivedAt,
        isDoorChecked: facts.doorCheck !== null,
        readyAt: fast.readyAt,
        hungryFromAt: fast.hungryFromAt,
        longestMinutes: plan.kind === 'standard' ? plan.longestMinutes : Number.MAX_SAFE_INTEGER,
      };
    }),
    rooms: sheet.rooms.map((room) => ({ id: room.id, freeAt: roomFreeAt(room, sheet.facts) })),
    now,
  });
  if (next.childId === null) return null;
  const facts = waiting.find(({ plan }) => plan.childId === next.childId);
  const room = sheet.rooms.find(({ id }) => id === next.roomId);
  if (!facts || !room) return null;
  const fast = fastSoFar(facts, now);
  const { callMe, morningId, zone } = facts.plan;
  return {
    morningId,
    roomId: room.id,
    says: suggestionSays(words, { callMe, roomName: room.name, reason: next.reason, fast, zone }),
    explains: orderExplained(words, next.explanation, reasonSays(words, next.reason)),
  };
}
