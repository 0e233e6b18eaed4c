import type { Explanation } from '../../shared/domain/explanation';
import type { FastingPlan } from '../../shared/domain/fasting-plan';
import { durationInWords } from '../wording/clinic-measures';
import type { ClinicWords } from '../wording/clinic-words';
import type { MorningPlan } from '../series/morning-plans';

/** How plan, answer, fast and order were reached, as lines that staff read. */

type Inputs = Explanation['inputs'];

const numberOf = (inputs: Inputs, name: string): number | null => {
  const value = inputs[name];
  return typeof value === 'number' ? value : null;
};
const minutesSay = (words: ClinicWords, inputs: Inputs, name: string): string =>
  durationInWords(words, numberOf(inputs, name) ?? 0);
const clockSays = (words: ClinicWords, inputs: Inputs, name: string, zone: string): string => {
  const at = numberOf(inputs, name);
  return at === null ? '' : words.clock(at, zone);
};

/** The plan of a morning, whose hours these are, and which usual night feed falls away. */
export const planExplained = (words: ClinicWords, morning: MorningPlan): Explanation[] =>
  fastingPlanSays(words, morning.plan, {
    zone: morning.zone,
    signer: morning.individualPlan?.signedBy ?? '',
    source: morning.protocol.says,
  });

/** The same of a plan that no morning goes by yet. */
export function fastingPlanSays(
  words: ClinicWords,
  plan: FastingPlan,
  {
    zone,
    signer,
    source,
  }: { readonly zone: string; readonly signer: string; readonly source: string },
): Explanation[] {
  const { explanation } = plan;
  if (plan.kind === 'individual') {
    const reasons = words.list(plan.reasons.map((one) => words.text(`clinic.individual.${one}`)));
    return [
      { ...explanation, says: words.text(`clinic.explain.${explanation.rule}`, { reasons }) },
    ];
  }
  const { inputs } = explanation;
  const says = words.text(planKey(explanation, plan.allSame), {
    stop: clockSays(words, inputs, 'stopAt', zone),
    nothing: clockSays(words, inputs, 'nothingAt', zone),
    arrival: clockSays(words, inputs, 'arrivalAt', zone),
    least: minutesSay(words, inputs, 'leastMinutes'),
    longest: minutesSay(words, inputs, 'longestMinutes'),
    clock: String(inputs['clock'] ?? ''),
    version: String(inputs['individualVersion'] ?? ''),
    signer,
    source: words.sentence(source),
  });
  const away = plan.nightFeeds.filter(({ fallsAway }) => fallsAway);
  if (away.length === 0) return [{ ...explanation, says }];
  const times = away.map(({ at }) => words.clock(at, zone));
  return [
    { ...explanation, says },
    {
      rule: 'fasting-plan.night-feeds',
      inputs: { fallAway: times.join(', '), stopAt: plan.mealStopAt },
      says: words.text('clinic.explain.night-feeds', { times: words.list(times) }),
    },
  ];
}

function planKey({ rule, inputs }: Explanation, isAllSame: boolean): string {
  // Version 0 is being composed and signed by nobody yet.
  if (inputs['individualVersion'] === 0) return 'clinic.explain.fasting-plan.individual-draft';
  if (rule !== 'fasting-plan.protocol') return `clinic.explain.${rule}`;
  if (!isAllSame) return 'clinic.explain.fasting-plan.protocol-items';
  return inputs['clock'] == null
    ? 'clinic.explain.fasting-plan.protocol'
    : 'clinic.explain.fasting-plan.protocol-clock';
}

/** The fast as the door, or else the family, tells it. */
export function fastExplained(
  words: ClinicWords,
  explanation: Explanation,
  zone: string,
): Explanation {
  const { rule, inputs } = explanation;
  const taken = [
    takenSays(words, inputs, 'food', zone),
    takenSays(words, inputs, 'drink', zone),
  ].filter((says) => says !== null);
  return {
    ...explanation,
    says: words.text(`clinic.explain.${rule}`, {
      taken: taken.length > 0 ? words.list(taken) : words.text('clinic.explain.taken.nothing'),
      ready: clockSays(words, inputs, 'readyAt', zone),
      hungry: clockSays(words, inputs, 'hungryFromAt', zone),
      longest: clockSays(words, inputs, 'longestEndsAt', zone),
    }),
  };
}

function takenSays(
  words: ClinicWords,
  inputs: Inputs,
  kind: 'food' | 'drink',
  zone: string,
): string | null {
  const at = numberOf(inputs, `${kind}At`);
  if (at === null) return null;
  const item = inputs[`${kind}Item`];
  const said = { at: words.clock(at, zone) };
  if (typeof item === 'string')
    return words.text('clinic.explain.taken.food', {
      ...said,
      item: words.text(`clinic.item.${item}`),
    });
  return words.text(`clinic.explain.taken.${kind === 'food' ? 'meal' : 'drink'}`, said);
}

/** What the family's answer was taken to mean, as it was kept with the answer. */
export function answerExplained(words: ClinicWords, explanation: Explanation): Explanation {
  const reached = String(explanation.inputs['reached'] ?? '')
    .split(', ')
    .map((key) => `clinic.explain.reached.${key}`)
    .filter((key) => words.has(key))
    .map((key) => words.text(key));
  return {
    ...explanation,
    says: words.text('clinic.explain.fasting-check', { reasons: words.list(reached) }),
  };
}

/** Why this child is suggested next. */
export function orderExplained(
  words: ClinicWords,
  explanation: Explanation,
  reason: string,
): Explanation {
  const { inputs } = explanation;
  const left = numberOf(inputs, 'minutesLeft');
  const common = {
    ready: numberOf(inputs, 'ready') ?? 0,
    waiting: numberOf(inputs, 'waiting') ?? 0,
    reason,
  };
  return {
    ...explanation,
    says:
      left === null || left <= 0
        ? words.text('clinic.explain.order-of-morning', common)
        : words.text('clinic.explain.order-of-morning-left', {
            ...common,
            left: durationInWords(words, left),
          }),
  };
}
