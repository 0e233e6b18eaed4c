import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { ChildFace } from '../picture/child-face';
import type { Lane } from './path-rows';

/** One lane a child: full, or two thin lines where nothing goes into the mouth. A drawing of what the words say. */
@Component({
  selector: 'td-path-lanes',
  imports: [ChildFace],
  template: `@for (lane of lanes(); track lane.childId) {
      <span
        [class]="'lane child-' + lane.place"
        [class.lane-last]="lane.isLast"
        [attr.data-mouth]="lane.mouth"
      >
        @if (lane.face; as face) {
          <td-child-face [face]="face" [place]="lane.place" />
        }
      </span>
    }
    @if (isTied()) {
      <span class="tie"></span>
    }`,
  host: { class: 'lanes', '[class.lanes-many]': 'isCrowded()', 'aria-hidden': 'true' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PathLanes {
  readonly lanes = input.required<readonly Lane[]>();
  readonly isTied = input(false);
  /** Neighbours that change in the same step get smaller faces. */
  protected readonly isCrowded = computed(
    () => this.lanes().filter((lane) => lane.face !== null).length > 1,
  );
}
