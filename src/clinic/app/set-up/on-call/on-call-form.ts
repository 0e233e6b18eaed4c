import { FormArray, FormControl, FormGroup } from '@angular/forms';
import type { OnCallList } from '../../../../../shared/contracts/alerts';

type Turn = OnCallList['turns'][number];
type Person = OnCallList['staff'][number];

const control = <Value>(value: Value): FormControl<Value> =>
  new FormControl(value, { nonNullable: true });

export type TurnGroup = ReturnType<typeof turnGroup>;
export type ReachGroup = ReturnType<typeof reachGroup>;
export type OnCallGroup = ReturnType<typeof onCallGroup>;

export const turnGroup = (turn: Turn | Omit<Turn, 'staffId'>) =>
  new FormGroup({
    staffId: control<number | null>('staffId' in turn ? turn.staffId : null),
    deputyId: control(turn.deputyId),
    weekdays: control([...turn.weekdays]),
    from: control(turn.from),
    until: control(turn.until),
    fromOn: control(turn.fromOn),
    untilOn: control(turn.untilOn ?? ''),
  });

export const reachGroup = (person: Person) =>
  new FormGroup({
    staffId: control(person.id),
    phone: control(person.phone ?? ''),
    byText: control(person.byText),
    byMail: control(person.byMail),
    language: control(person.language),
  });

export const onCallGroup = (list: OnCallList) =>
  new FormGroup({
    waitMinutes: control(list.waitMinutes),
    turns: new FormArray(list.turns.map(turnGroup)),
    reach: new FormArray(list.staff.map(reachGroup)),
  });

/** The days of a working week from today on, at all hours. */
export const newTurn = (fromOn: string): TurnGroup =>
  turnGroup({
    deputyId: null,
    weekdays: [1, 2, 3, 4, 5],
    from: '04:00',
    until: '18:00',
    fromOn,
    untilOn: null,
  });

/** As the request takes it: those alone are reached anew who stand on the list. */
export function onCallRequest(group: OnCallGroup, version: number): object {
  const { waitMinutes, turns, reach } = group.getRawValue();
  const listed = new Set(turns.flatMap(({ staffId, deputyId }) => [staffId, deputyId]));
  return {
    waitMinutes,
    version,
    turns: turns.map((turn) => ({ ...turn, untilOn: turn.untilOn === '' ? null : turn.untilOn })),
    reach: reach.filter(({ staffId }) => listed.has(staffId)),
  };
}
