import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { NextMorning } from '../../../../shared/contracts/family-morning';
import { ShownClock } from './shown-clock';
import { PathLanes } from './path-lanes';
import { placeOf, timeLeft, type Lane, type PathChild } from './path-rows';

/** The head of each lane: whose it is, until when the child may eat or drink, and what is left of that time. */
@Component({
  selector: 'td-lane-heads',
  imports: [PathLanes, ShownClock],
  templateUrl: './lane-heads.html',
  host: { class: 'path part part-evening', '[style.--children]': 'children().length || 1' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LaneHeads {
  readonly children = input.required<NextMorning['children']>();
  readonly now = input.required<number>();

  protected readonly heads = computed(() =>
    this.children().map((child, index) => ({
      child,
      place: placeOf(index),
      lanes: this.children().map((other, lane) => headLane(other, lane, index)),
      left: child.stopAt ? timeLeft(child.stopAt.at, this.now()) : null,
    })),
  );
  protected readonly keyLanes = computed(() =>
    this.children().map((child, index) => headLane(child, index, this.children().length)),
  );
}

/** Lanes begin one under the other: those before are there already, those after are not yet. */
function headLane(child: PathChild, lane: number, head: number): Lane {
  return {
    childId: child.childId,
    place: placeOf(lane),
    mouth: lane < head ? 'full' : lane === head ? 'starts' : 'none',
    face: lane === head ? child.face : null,
    isLast: false,
  };
}
