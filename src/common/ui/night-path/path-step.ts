import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { PictureMark } from '../picture/picture-mark';
import { ShownClock } from './shown-clock';
import type { StepRow } from './path-rows';

/** What to do at one time of the night: the time largest, a picture, one sentence. */
@Component({
  selector: 'td-path-step',
  imports: [PictureMark, ShownClock],
  templateUrl: './path-step.html',
  host: { class: 'step-text' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PathStepText {
  readonly row = input.required<StepRow>();
  protected readonly step = computed(() => this.row().step);
  /** One picture stands beside its sentence, which is its caption; several bring captions of their own. */
  protected readonly single = computed(() =>
    !this.step().isLoud && this.step().pictures.length === 1 ? this.step().pictures[0] : null,
  );
}
