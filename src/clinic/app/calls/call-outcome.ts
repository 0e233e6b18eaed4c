import type { CallDoneRequest } from '../../../../shared/contracts/calls';

type Outcome = CallDoneRequest['outcome'];

/** The first tap: how the telephone was answered. */
export type FirstTap = 'answered' | 'silent' | 'wrong' | 'needless';

/** The second tap is the answer and is sent. */
export interface SecondTap {
  readonly outcome: Outcome;
  readonly says: string;
  /** Kept in front of what the caller notes. */
  readonly note: string | null;
}

export const firstTaps: readonly { readonly value: FirstTap; readonly says: string }[] = [
  { value: 'answered', says: $localize`:@@clinic.calls.answered:Someone answered` },
  { value: 'silent', says: $localize`:@@clinic.calls.silent:No answer, or a machine` },
  { value: 'wrong', says: $localize`:@@clinic.calls.wrong:Wrong number` },
  { value: 'needless', says: $localize`:@@clinic.calls.needless:No call needed` },
];

const tap = (outcome: Outcome, says: string, note: string | null = null): SecondTap => ({
  outcome,
  says,
  note,
});

export const secondTaps: Readonly<Record<FirstTap, readonly SecondTap[]>> = {
  answered: [
    tap('told', $localize`:@@clinic.calls.told:Told everything, said back right`),
    tap('reached', $localize`:@@clinic.calls.reached:Spoke with them, not all told`),
  ],
  silent: [
    tap('not-reached', $localize`:@@clinic.calls.not-reached:No answer: call again later`),
    tap(
      'not-reached',
      $localize`:@@clinic.calls.machine:A machine: said only our number`,
      $localize`:@@clinic.calls.machine-note:A machine answered; said only our number.`,
    ),
  ],
  wrong: [
    tap('wrong-number', $localize`:@@clinic.calls.not-theirs:Not this family: find another number`),
  ],
  needless: [
    tap('not-needed', $localize`:@@clinic.calls.settled:Settled otherwise: take it off the list`),
  ],
};

/** Who was told something in another language is kept with who interpreted. */
export const needsInterpreterName = (outcome: Outcome, needsInterpreter: boolean): boolean =>
  needsInterpreter && outcome === 'told';

export function outcomeRequest(
  second: SecondTap,
  { interpreter, note }: { readonly interpreter: string; readonly note: string },
): CallDoneRequest {
  const notes = [second.note, note.trim() === '' ? null : note.trim()].filter(
    (one): one is string => one !== null,
  );
  return {
    outcome: second.outcome,
    interpreter: interpreter.trim() === '' ? null : interpreter.trim(),
    note: notes.length === 0 ? null : notes.join(' '),
  };
}
