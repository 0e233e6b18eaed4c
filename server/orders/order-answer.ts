import type { Sequelize, Transaction } from 'sequelize';
import type { Order as OrderAnswer } from '../../shared/contracts/orders';
import type { Day } from '../../shared/domain/day';
import type { StaffMember } from '../auth/current-user';
import { withinReach } from '../children/reach';
import { select } from '../database/connection';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import type { StoredOrderDetails } from './order-model';

interface OrderRow {
  id: number;
  version: number;
  childId: number;
  childName: string;
  orderedByName: string;
  answerTo: string;
  reason: string;
  morningsPlanned: number;
  intendsToTreat: 0 | 1;
  details: StoredOrderDetails;
  createdAt: Date;
  signedAt: Date | null;
  signedBy: string | null;
  consentBy: string | null;
  consentHow: 'in-person' | 'telephone';
  consentLanguage: string;
  consentFormVersion: string;
  consentInterpreter: string | null;
  consentAt: Date;
  reportingDueOn: Day | null;
  reportedAt: Date | null;
  seriesId: number | null;
}

export interface OrdersWanted {
  readonly orderId?: number;
  readonly childId?: number;
}

const longestList = 200;

/** Orders within the reader's reach as the clinic sees them, the newest first. */
export async function orderAnswers(
  db: Sequelize,
  staff: StaffMember,
  wanted: OrdersWanted,
  transaction?: Transaction,
): Promise<OrderAnswer[]> {
  const reach = withinReach(staff);
  const conditions = [
    reach.sql,
    ...(wanted.orderId === undefined ? [] : ['orders.id = :orderId']),
    ...(wanted.childId === undefined ? [] : ['orders.child_id = :childId']),
  ];
  const rows = await select<OrderRow>(
    db,
    `SELECT orders.id, orders.version, orders.child_id AS childId, children.full_name AS childName,
       orders.ordered_by_name AS orderedByName, orders.answer_to AS answerTo, orders.reason,
       orders.mornings_planned AS morningsPlanned, orders.intends_to_treat AS intendsToTreat, orders.details,
       orders.created_at AS createdAt, orders.signed_at AS signedAt, signer.full_name AS signedBy,
       giver.full_name AS consentBy, consent.how AS consentHow, consent.language AS consentLanguage,
       consent.form_version AS consentFormVersion, consent.interpreter AS consentInterpreter,
       consent.given_at AS consentAt, orders.reporting_due_on AS reportingDueOn,
       orders.reported_at AS reportedAt, series.id AS seriesId
     FROM orders
     JOIN children ON children.id = orders.child_id
     JOIN households ON households.id = children.household_id
     LEFT JOIN staff signer ON signer.id = orders.signed_by_staff_id
     LEFT JOIN procedure_consents consent ON consent.order_id = orders.id
     LEFT JOIN family_members giver ON giver.id = consent.family_member_id
     LEFT JOIN series ON series.order_id = orders.id
     WHERE ${conditions.join(' AND ')}
     ORDER BY orders.id DESC LIMIT ${longestList}`,
    { ...reach.replacements, ...wanted },
    transaction,
  );
  return rows.map((row) => answerFrom(clinicWords(staff.language), row));
}

function answerFrom(words: ClinicWords, row: OrderRow): OrderAnswer {
  const {
    consentBy,
    consentHow,
    consentLanguage,
    consentFormVersion,
    consentInterpreter,
    consentAt,
    ...order
  } = row;
  return {
    ...order,
    intendsToTreat: row.intendsToTreat === 1,
    createdAt: row.createdAt.toISOString(),
    signedAt: row.signedAt?.toISOString() ?? null,
    reportedAt: row.reportedAt?.toISOString() ?? null,
    consent:
      consentBy === null
        ? null
        : {
            givenBy: consentBy,
            how: consentHow,
            language: consentLanguage,
            formVersion: consentFormVersion,
            interpreter: consentInterpreter,
            givenAt: consentAt.toISOString(),
          },
    stillNeeded: stillNeeded(words, {
      isSigned: row.signedAt !== null,
      hasConsent: consentBy !== null,
    }),
  };
}

/** What still stands between an order and its mornings. */
export function stillNeeded(
  words: ClinicWords,
  order: { readonly isSigned: boolean; readonly hasConsent: boolean },
): string[] {
  return [
    ...(order.isSigned ? [] : [words.text('clinic.order.needs-signature')]),
    ...(order.hasConsent ? [] : [words.text('clinic.order.needs-consent')]),
  ];
}
