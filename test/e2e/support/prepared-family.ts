import { randomUUID } from 'node:crypto';
import type { AddChildRequest, ChildRecord } from '../../../shared/contracts/children';
import type {
  AddOrderRequest,
  Order,
  ProcedureConsentRequest,
} from '../../../shared/contracts/orders';
import type { PlanSeriesAnswer, SeriesProposal } from '../../../shared/contracts/series';
import { addDays, instantOf } from '../../../shared/domain/zone';
import { House, zone } from './house';
import { linkIn } from './stand-ins';

export interface PreparedFamily {
  readonly childId: number;
  readonly fullName: string;
  readonly callMe: string;
  readonly bornOn: string;
  readonly motherId: number;
  readonly phone: string;
  readonly orderId: number;
}

/**
 * A child with a mother who may be texted at any hour; order signed, consent given. Made without a
 * screen. @throws when the number has had texts: two tests of one house must not share a family's.
 */
export async function prepareFamily(
  house: House,
  {
    fullName,
    callMe,
    phone,
    email = null,
    language = 'en',
    agreesToEarlyTexts = true,
  }: {
    fullName: string;
    callMe: string;
    phone: string;
    /** With one the mother gets calendar entries. */
    email?: string | null;
    language?: string;
    agreesToEarlyTexts?: boolean;
  },
): Promise<PreparedFamily> {
  if ((await house.standIns.texts(phone)).length > 0) {
    throw new Error(`${phone} belongs to a family of an earlier test.`);
  }
  const bornOn = addDays(await house.today(), -800);
  const request: AddChildRequest = {
    fullName,
    callMe,
    familyLabel: 'Our child',
    bornOn,
    feeding: 'family-food',
    cautions: [],
    travelMinutes: 30,
    familyMembers: [
      {
        fullName: `Mother of ${callMe}`,
        standing: 'guardian',
        relationship: 'mother',
        mayConsent: true,
        seesResults: true,
        phone,
        email,
        readsLanguage: language,
        readsHow: 'well',
        speaksLanguage: 'English',
        needsInterpreter: false,
        agreesToTexts: true,
        agreesToEarlyTexts,
        agreesToMail: email !== null,
      },
    ],
    submissionKey: randomUUID(),
  };
  const child = await house.post<ChildRecord>('/api/clinic/children', request);
  const motherId = child.familyMembers[0]?.id ?? 0;
  const orderId = await signedOrder(house, child.id, motherId);
  return { childId: child.id, fullName, callMe, bornOn, motherId, phone, orderId };
}

async function signedOrder(house: House, childId: number, motherId: number): Promise<number> {
  const order: AddOrderRequest = {
    childId,
    orderedByName: 'Dr. Ines Okafor',
    answerTo: 'Alder Street',
    reason: 'Contact of a person with tuberculosis.',
    morningsPlanned: 3,
    intendsToTreat: false,
    details: {
      weightKg: 12,
      sourceCase: 'not-known',
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
  };
  const { id, version } = await house.post<Order>('/api/clinic/orders', order);
  const clinician = await House.open('okafor');
  await clinician.post(`/api/clinic/orders/${id}/signature`, { version });
  await clinician.close();
  const consent: ProcedureConsentRequest = {
    familyMemberId: motherId,
    legalBasis: 'parent',
    how: 'in-person',
    language: 'en',
    formVersion: 'A-3',
    comfortPlan: 'On the lap.',
    hasParentInRoom: true,
    givenAt: new Date(await house.now()).toISOString(),
  };
  await house.post(`/api/clinic/orders/${id}/consent`, consent);
  return id;
}

export interface PreparedMorning {
  readonly on: string;
  readonly arrivalAt: number;
  readonly seriesId: number;
}

/** Plans the first run that is offered; the mother brings the child. @returns its first morning. */
export async function planMornings(
  house: House,
  { orderId, motherId }: PreparedFamily,
): Promise<PreparedMorning> {
  const proposal = await house.post<SeriesProposal>('/api/clinic/series/proposals', {
    orderIds: [orderId],
    from: await house.today(),
    morningsPlanned: 3,
  });
  const [run] = proposal.runs;
  const [first] = run?.days ?? [];
  if (!run || !first) throw new Error('No run of mornings is offered.');
  const { series } = await house.post<PlanSeriesAnswer>('/api/clinic/series', {
    orderIds: [orderId],
    days: run.days,
    escorts: run.days.map(({ on }) => ({ on, familyMemberId: motherId })),
  });
  const time = first.places[0]?.arrivalTime ?? '';
  return {
    on: first.on,
    arrivalAt: instantOf({ on: first.on, time, zone }),
    seriesId: series[0]?.id ?? 0,
  };
}

/** Sends the invitation. @returns the link in the text. */
export async function inviteMother(
  house: House,
  { motherId, phone }: PreparedFamily,
): Promise<string> {
  const before = (await house.standIns.texts(phone)).length;
  await house.post(`/api/clinic/family-members/${motherId}/invitations`, {});
  const { body } = await house.standIns.text(phone, /\/i\//, before);
  return linkIn(body, 'i');
}

/** Moves the clock to the morning question. @returns the household's link in the text. */
export async function toMorningQuestion(
  house: House,
  { phone }: PreparedFamily,
  { on, arrivalAt }: PreparedMorning,
): Promise<string> {
  await house.moveTo(instantOf({ on: addDays(on, -1), time: '19:00', zone }));
  await house.moveTo(arrivalAt - 85 * 60_000);
  const { body } = await house.standIns.text(phone, /\/m\//);
  return linkIn(body, 'm');
}
