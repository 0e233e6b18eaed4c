import type { Sequelize, Transaction } from 'sequelize';
import type { z } from 'zod';
import type { SupplyList, supplyListRequest } from '../../shared/contracts/supplies';
import { startingSupplyRules, type SupplyRule } from '../../shared/domain/supplies';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { invalid } from '../http/problem';
import { announce } from '../live/announce';
import { clinicWords } from '../wording/clinic-words';

/** What a site lays ready, with its own counts; empty until it has taken over or made a list. */
export function supplyRulesOf(
  db: Sequelize,
  siteId: number,
  transaction?: Transaction,
): Promise<SupplyRule[]> {
  return select<SupplyRule>(
    db,
    `SELECT item, per_child AS perChild, per_morning AS perMorning, children_per_spare AS childrenPerSpare,
       under_months AS underMonths FROM supply_rules WHERE site_id = :siteId ORDER BY position, item`,
    { siteId },
    transaction,
  );
}

export async function readSupplyList({ db }: Context, staff: StaffMember): Promise<SupplyList> {
  const words = clinicWords(staff.language);
  const told = (rules: readonly SupplyRule[]): SupplyList['rules'] =>
    rules.map((rule) => ({ ...rule, says: words.text(`clinic.supply.${rule.item}`) }));
  return {
    rules: told(await supplyRulesOf(db, staff.siteId)),
    startingRules: told(startingSupplyRules),
  };
}

/** Replaces the site's list. @throws Problem 422 when a thing stands on it twice */
export async function writeSupplyList(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  { rules }: z.output<typeof supplyListRequest>,
): Promise<SupplyList> {
  const { db, clock } = context;
  const { siteId } = staff;
  rules.forEach(({ item }, index) => {
    if (rules.findIndex((other) => other.item === item) !== index)
      throw invalid([
        { path: `rules.${index}.item`, message: 'Each thing stands on the list once.' },
      ]);
  });
  await inTransaction(db, async (transaction) => {
    await change(db, 'DELETE FROM supply_rules WHERE site_id = :siteId', { siteId }, transaction);
    for (const [position, rule] of rules.entries())
      await change(
        db,
        `INSERT INTO supply_rules (site_id, item, per_child, per_morning, children_per_spare, under_months, position)
         VALUES (:siteId, :item, :perChild, :perMorning, :childrenPerSpare, :underMonths, :position)`,
        { ...rule, siteId, position },
        transaction,
      );
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'supply-list',
      childIds: [],
      detail: { things: rules.length },
      at: clock.now(),
    });
    await announce(db, transaction, 'mornings');
  });
  return readSupplyList(context, staff);
}
