import type { z } from 'zod';
import type { SetOut, setOutTickRequest } from '../../shared/contracts/supplies';
import { ageOn, addDays, compareDays, type Day } from '../../shared/domain/day';
import { suppliesForMorning, type SupplyItem } from '../../shared/domain/supplies';
import { dayOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { announce } from '../live/announce';
import { localTimeOfColumn, siteOf } from '../sites/sites';
import { ageInWords } from '../wording/clinic-measures';
import { clinicWords } from '../wording/clinic-words';
import { supplyRulesOf } from './supply-list';

interface Tick {
  item: SupplyItem;
  isReady: 0 | 1;
  note: string | null;
  tickedBy: string;
}

/** What is to lie ready for a morning, counted from its children with spares, and what somebody has looked at. */
export async function readSetOut(
  { db, clock }: Context,
  actor: Actor,
  staff: StaffMember,
  asked: Day | undefined,
): Promise<SetOut> {
  const { siteId } = staff;
  const now = clock.now();
  const words = clinicWords(staff.language);
  const site = await siteOf(db, siteId);
  const on = asked ?? addDays(dayOf(now, site.zone), 1);
  const children = await select<{
    childId: number;
    callMe: string;
    bornOn: Day;
    arrivalTime: string;
  }>(
    db,
    `SELECT children.id AS childId, children.call_me AS callMe, children.born_on AS bornOn,
       mornings.arrival_time AS arrivalTime
     FROM mornings JOIN children ON children.id = mornings.child_id
     WHERE mornings.site_id = :siteId AND mornings.planned_on = :on AND mornings.state IN ('planned', 'here', 'collecting')
     ORDER BY mornings.arrival_at, mornings.id`,
    { siteId, on },
  );
  const rules = await supplyRulesOf(db, siteId);
  const ticks = await select<Tick>(
    db,
    `SELECT ticks.item, ticks.is_ready AS isReady, ticks.note, staff.full_name AS tickedBy
     FROM set_out_ticks ticks JOIN staff ON staff.id = ticks.ticked_by_staff_id
     WHERE ticks.site_id = :siteId AND ticks.set_out_on = :on`,
    { siteId, on },
  );
  const tickOf = new Map(ticks.map((tick) => [tick.item, tick]));
  const ages = children.map(({ bornOn }) => ({
    ageMonths: compareDays(bornOn, on) <= 0 ? ageOn(bornOn, on).months : 0,
  }));
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'set-out',
    childIds: children.map(({ childId }) => childId),
    at: now,
  });
  return {
    on,
    hasList: rules.length > 0,
    children: children.map(({ callMe, bornOn, arrivalTime }) => ({
      callMe,
      arrivalTime: localTimeOfColumn(arrivalTime),
      ageInWords: ageInWords(words, bornOn, on),
    })),
    lines: suppliesForMorning(ages, rules).map(({ item, count, ofWhichSpare }) => {
      const tick = tickOf.get(item);
      return {
        item,
        says: words.text(`clinic.supply.${item}`),
        count,
        ofWhichSpare,
        isReady: tick ? tick.isReady === 1 : null,
        note: tick?.note ?? null,
        tickedBy: tick?.tickedBy ?? null,
      };
    }),
  };
}

/** One person looks: what is missing is named, everything else is ready with one act. */
export async function tickSetOut(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  on: Day,
  { items, isReady, note }: z.output<typeof setOutTickRequest>,
): Promise<SetOut> {
  const { db, clock } = context;
  const before = await readSetOut(context, actor, staff, on);
  const wanted = before.lines
    .filter((line) => (items.length > 0 ? items.includes(line.item) : line.isReady === null))
    .map(({ item }) => item);
  await inTransaction(db, async (transaction) => {
    for (const item of wanted)
      await change(
        db,
        `INSERT INTO set_out_ticks (site_id, set_out_on, item, is_ready, note, ticked_by_staff_id, ticked_at)
         VALUES (:siteId, :on, :item, :isReady, :note, :staffId, :now)
         ON DUPLICATE KEY UPDATE is_ready = :isReady, note = :note, ticked_by_staff_id = :staffId, ticked_at = :now`,
        {
          siteId: staff.siteId,
          on,
          item,
          isReady,
          note,
          staffId: staff.id,
          now: new Date(clock.now()),
        },
        transaction,
      );
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'set-out',
      childIds: [],
      detail: { on, items: wanted, isReady, note },
      at: clock.now(),
    });
    await announce(db, transaction, 'mornings');
  });
  return readSetOut(context, actor, staff, on);
}
