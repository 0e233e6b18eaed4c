import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type {
  addOrderRequest,
  Order as OrderAnswer,
  OrderList,
} from '../../shared/contracts/orders';
import { addDays, dayOf } from '../../shared/domain/zone';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { childInReach } from '../children/reach';
import type { Context } from '../context';
import { inTransaction } from '../database/connection';
import { addOnce } from '../http/add-once';
import { changedMeanwhile, invalid, notFound, Problem, type FieldError } from '../http/problem';
import { announce } from '../live/announce';
import { reportingDueOn, reportingRuleOf } from '../sites/rule-packs';
import { closedDays } from '../sites/closed-days';
import { siteOf } from '../sites/sites';
import { orderAnswers } from './order-answer';
import { Order } from './order-model';

export type AddOrder = z.output<typeof addOrderRequest>;

/** Adds an order; the stop card comes first. @returns the id, of the first try when repeated. */
export async function addOrder(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  request: AddOrder,
): Promise<number> {
  const { db, clock } = context;
  const now = clock.now();
  const child = await childInReach(db, staff, request.childId);
  refuseByStopCard(request);
  const site = await siteOf(db, child.siteId);
  const { medicinesSince } = request.details;
  if (medicinesSince !== null && medicinesSince > dayOf(now, site.zone))
    throw invalid([
      {
        path: 'details.medicinesSince',
        message: 'This day lies in the future. Give the day of the first dose.',
      },
    ]);
  const submission = { matter: 'order', key: request.submissionKey, at: now };
  const { id } = await addOnce(db, submission, async (transaction) => {
    const order = await Order.create(
      {
        childId: child.id,
        orderedByName: request.orderedByName,
        answerTo: request.answerTo,
        reason: request.reason,
        details: { ...request.details, stopCard: request.stopCard },
        morningsPlanned: request.morningsPlanned,
        intendsToTreat: request.intendsToTreat,
        createdByStaffId: staff.id,
        createdAt: new Date(now),
      },
      { transaction },
    );
    await noteChange(context, transaction, actor, 'order-added', child.id, order.id);
    return order.id;
  });
  return id;
}

const stopSigns = {
  hasSuspectedMeningitis: 'suspected meningitis',
  hasSuspectedMiliaryDisease: 'suspected miliary disease',
  hasBreathingDistress: 'breathing distress',
  isDrowsy: 'drowsiness',
} as const;

/**
 * @throws Problem 422 'not-bookable' for a child who needs a physician now, 'offer-sputum-first' for one who can bring up
 * sputum and whose order does not say why it should be the stomach all the same.
 */
function refuseByStopCard({ stopCard, details }: AddOrder): void {
  const errors = (Object.keys(stopSigns) as (keyof typeof stopSigns)[])
    .filter((sign) => stopCard[sign])
    .map((sign): FieldError => ({
      path: `stopCard.${sign}`,
      message: `With ${stopSigns[sign]} no mornings are booked.`,
    }));
  if (errors.length > 0)
    throw new Problem(
      422,
      'not-bookable',
      'This child cannot wait for three mornings: telephone the physician now.',
      { errors },
    );
  if (stopCard.canBringUpSputum && details.note === null)
    throw new Problem(
      422,
      'offer-sputum-first',
      'A child who can bring up sputum is offered that first. If it was offered, write in the note what came of it.',
      { errors: [{ path: 'details.note', message: 'Write what came of the offer of sputum.' }] },
    );
}

export async function listOrders(
  { db, clock }: Context,
  actor: Actor,
  staff: StaffMember,
  childId?: number,
): Promise<OrderList> {
  const orders = await orderAnswers(db, staff, { childId });
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'orders',
    childIds: orders.map((order) => order.childId),
    at: clock.now(),
  });
  return { orders };
}

/** @throws Problem 404 */
export async function readOrder(
  { db, clock }: Context,
  actor: Actor,
  staff: StaffMember,
  orderId: number,
): Promise<OrderAnswer> {
  const order = await orderInReach(db, staff, orderId);
  await record(db, undefined, actor, {
    action: 'seen',
    matter: 'order',
    childIds: [order.childId],
    at: clock.now(),
  });
  return order;
}

/** No report waits longer, however many days in a row are closed. */
const reportingLooksAheadDays = 60;

/** A clinician signs; suspicion starts the clock of the report where the law says so. A repeat changes nothing. */
export async function signOrder(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  orderId: number,
  version?: number,
): Promise<void> {
  const { db, clock } = context;
  const now = clock.now();
  await inTransaction(db, async (transaction) => {
    const order = await orderInReach(db, staff, orderId, transaction);
    if (order.signedAt !== null) return;
    if (version !== undefined && version !== order.version) throw changedMeanwhile();
    const child = await childInReach(db, staff, order.childId, transaction);
    const site = await siteOf(db, child.siteId, transaction);
    const today = dayOf(now, site.zone);
    const rule = reportingRuleOf(site);
    const until = addDays(today, reportingLooksAheadDays);
    const closed = await closedDays(db, site.id, today, until, transaction);
    const [touched] = await Order.update(
      {
        signedByStaffId: staff.id,
        signedAt: new Date(now),
        reportingDueOn: rule
          ? reportingDueOn(rule, today, new Set(closed.map(({ on }) => on)))
          : null,
        version: order.version + 1,
      },
      { where: { id: orderId, version: order.version, signedAt: null }, transaction },
    );
    if (touched === 0) throw changedMeanwhile();
    await noteChange(context, transaction, actor, 'order-signed', order.childId, orderId);
  });
}

/** Notes that the health department was told. A repeat keeps the first time. */
export async function noteReported(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  orderId: number,
): Promise<void> {
  const { db, clock } = context;
  await inTransaction(db, async (transaction) => {
    const order = await orderInReach(db, staff, orderId, transaction);
    if (order.signedAt === null)
      throw new Problem(409, 'not-signed', 'The order is not signed yet; the report follows it.');
    const [touched] = await Order.update(
      {
        reportedAt: new Date(clock.now()),
        reportedByStaffId: staff.id,
        version: order.version + 1,
      },
      { where: { id: orderId, reportedAt: null }, transaction },
    );
    if (touched > 0)
      await noteChange(context, transaction, actor, 'order-reported', order.childId, orderId);
  });
}

/** @throws Problem 404 */
export async function orderInReach(
  db: Context['db'],
  staff: StaffMember,
  orderId: number,
  transaction?: Transaction,
): Promise<OrderAnswer> {
  const [order] = await orderAnswers(db, staff, { orderId }, transaction);
  if (!order) throw notFound('This order');
  return order;
}

export async function noteChange(
  { db, clock }: Context,
  transaction: Transaction,
  actor: Actor,
  matter: string,
  childId: number,
  orderId: number,
): Promise<void> {
  await record(db, transaction, actor, {
    action: 'changed',
    matter,
    childIds: [childId],
    detail: { orderId },
    at: clock.now(),
  });
  await announce(db, transaction, 'children', childId);
}
