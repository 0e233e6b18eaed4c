import {
  fastingCheck,
  type FastingAnswer,
  type FastingCheck,
  type FastingCheckRequest,
} from './fasting-check';
import { fastingPlan, type FastingPlan } from './fasting-plan';
import { startingProtocol } from './fasting-protocol';
import { instantOf } from './zone';

/** A Wednesday morning at 7:00 in Chicago, its telephone, its rooms and two children. */
export const zone = 'America/Chicago';
export const day = '2026-12-09';
export const at = (time: string, on = day): number => instantOf({ on, time, zone });
export const planOf = (bornOn: string, time = '07:00', on = day): FastingPlan =>
  fastingPlan({
    arrivalAt: at(time, on),
    zone,
    bornOn,
    feeding: 'family-food',
    protocol: startingProtocol,
    cautions: [],
    travelMinutes: 30,
    readyMinutes: 30,
  });
/** Least 4 h, longest 8 h; stop at 3:00. */
export const infant = planOf('2026-04-01');
/** Least 6 h, longest 13 h; stop at 1:00. */
export const toddler = planOf('2023-05-05');

export const request = (
  answer: FastingAnswer,
  more: Partial<FastingCheckRequest> = {},
): FastingCheckRequest => ({
  answer,
  plan: toddler,
  now: at('05:45'),
  arrivalAt: at('07:00'),
  likelyCollectionAt: at('07:30'),
  dawnPhone: { answersFrom: at('05:30'), answersUntil: at('08:00') },
  lastRoomStartAt: at('09:00'),
  laboratoryCutOffAt: at('11:30'),
  ...more,
});

export const check = (
  answer: FastingAnswer,
  more: Partial<FastingCheckRequest> = {},
): FastingCheck => {
  const result = fastingCheck(request(answer, more));
  if (!result.ok) throw new Error(result.error);
  return result;
};

export const closed = { now: at('04:45') };
export const fed = (time: string, on = day): FastingAnswer => ({
  kind: 'feed',
  lastIntakeAt: at(time, on),
});
export const sip = (time: string): FastingAnswer => ({ kind: 'sip', lastIntakeAt: at(time) });
