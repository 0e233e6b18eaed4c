import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { TimeInWords } from '../../../common/ui/night-path/time-in-words';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { ChildFace } from '../../../common/ui/picture/child-face';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import type { Question } from './answer-sheet';

/** When was it finished? Labelled instants with the sky as it was, so that no hour is ambiguous. */
@Component({
  selector: 'td-ask-when',
  imports: [ChildFace, PageHeading, PictureMark, TimeInWords],
  templateUrl: './ask-when.html',
  host: { class: 'ask' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AskWhen {
  readonly question = input.required<Question>();
  /** The child's lane on the night path. */
  readonly lane = input.required<number>();
  readonly answered = output<string | null>();
  readonly back = output();
  protected readonly given = computed(() =>
    this.question().choices.find(({ answer }) => answer === 'feed'),
  );

  /** The moon goes down from choice to choice. */
  protected moon(index: number): string {
    const last = Math.max(this.question().whenChoices.length - 2, 1);
    const way = Math.min(index / last, 1);
    return `translate(${Math.round(54 - 24 * way)} ${Math.round(10 + 24 * way)})`;
  }
}
