import { randomUUID } from 'node:crypto';
import type { AddChildRequest, ChildRecord } from '../../shared/contracts/children';
import type { AddOrderRequest, Order } from '../../shared/contracts/orders';
import { inTransaction } from '../../server/database/connection';
import { seedDemoClinic, type DemoClinic } from '../../server/database/seeds/demo-clinic';
import { seedWording } from '../../server/wording/seed-wording';
import type { Agent, TestServer } from './server';

/** Wednesday 14 April 2027, 13:00 in Chicago. */
export const wednesday = Date.parse('2027-04-14T18:00:00.000Z');

/** A site with two rooms, five places from 06:00, and a protocol, a profile and words that are signed. */
export function signedClinic({ context }: TestServer): Promise<DemoClinic> {
  const now = context.clock.now();
  return inTransaction(context.db, async (transaction) => {
    const clinic = await seedDemoClinic(context.db, transaction, now);
    const signedBy = { staffId: clinic.staffIds.get('okafor') ?? 0, at: now };
    await seedWording(context.db, { language: 'en', signedBy, now }, transaction);
    return clinic;
  });
}

let people = 0;

export const guardian = {
  fullName: 'Leila Amari',
  standing: 'guardian' as const,
  relationship: 'mother',
  legalBasis: 'parent',
  mayConsent: true,
  seesResults: true,
  phone: '(312) 555-0191',
  email: 'leila.amari@example.org',
  readsLanguage: 'en',
  readsHow: 'well' as const,
  speaksLanguage: 'French',
  needsInterpreter: false,
  agreesToTexts: true,
  agreesToEarlyTexts: true,
  agreesToMail: true,
};

export function newChild(more: Partial<AddChildRequest> = {}): AddChildRequest {
  people += 1;
  return {
    fullName: `Zoé Amari ${people}`,
    callMe: 'Zoé',
    familyLabel: 'Our girl',
    bornOn: '2024-02-29',
    recordNumber: null,
    feeding: 'family-food',
    cautions: [],
    travelMinutes: 30,
    familyMembers: [guardian],
    submissionKey: randomUUID(),
    ...more,
  };
}

export function newOrder(childId: number, more: Partial<AddOrderRequest> = {}): AddOrderRequest {
  return {
    childId,
    orderedByName: 'Dr. Ines Okafor',
    answerTo: 'Alder Street, extension 12',
    reason: 'Contact of a person with tuberculosis, cough.',
    morningsPlanned: 3,
    intendsToTreat: true,
    details: {
      weightKg: 12,
      sourceCase: 'known',
      sourceSusceptibility: 'not-known',
      hasBleedingHistory: false,
      hasNoseOrAirwayTrouble: false,
      hasRecentSurgery: false,
      hasInfectiousContactAtHome: false,
    },
    stopCard: {
      hasSuspectedMeningitis: false,
      hasSuspectedMiliaryDisease: false,
      hasBreathingDistress: false,
      isDrowsy: false,
      canBringUpSputum: false,
    },
    submissionKey: randomUUID(),
    ...more,
  };
}

export function newConsent(familyMemberId: number, more: Record<string, unknown> = {}) {
  return {
    familyMemberId,
    legalBasis: 'parent',
    how: 'in-person',
    language: 'en',
    formVersion: 'A-3',
    comfortPlan: 'On the lap.',
    hasParentInRoom: true,
    givenAt: '2027-04-14T15:00:00.000Z',
    ...more,
  };
}

export interface ReadyOrder {
  readonly orderId: number;
  readonly childId: number;
  readonly record: ChildRecord;
}

/** A child whose order is signed and whose guardian has consented. */
export async function readyOrder(
  clinician: Agent,
  child: Partial<AddChildRequest> = {},
  order: Partial<AddOrderRequest> = {},
): Promise<ReadyOrder> {
  const added = await clinician.post('/api/clinic/children').send(newChild(child)).expect(200);
  const record = added.body as ChildRecord;
  const ordered = await clinician
    .post('/api/clinic/orders')
    .send(newOrder(record.id, order))
    .expect(200);
  const { id: orderId } = ordered.body as Order;
  await clinician.post(`/api/clinic/orders/${orderId}/signature`).send({}).expect(200);
  const consent = newConsent(record.familyMembers[0]?.id ?? 0);
  await clinician.post(`/api/clinic/orders/${orderId}/consent`).send(consent).expect(200);
  return { orderId, childId: record.id, record };
}
