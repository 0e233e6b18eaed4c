import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { FastingAnswer } from '../../../../shared/contracts/family-morning';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { ChildFace } from '../../../common/ui/picture/child-face';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import type { Question } from './answer-sheet';

/** What did the child eat or drink? Four whole answers, one tap each. */
@Component({
  selector: 'td-ask-eaten',
  imports: [ChildFace, PageHeading, PictureMark, RouterLink],
  templateUrl: './ask-eaten.html',
  host: { class: 'ask' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AskEaten {
  readonly question = input.required<Question>();
  /** From 1. */
  readonly place = input.required<number>();
  /** The child's lane on the night path. */
  readonly lane = input.required<number>();
  readonly count = input.required<number>();
  readonly nextName = input('');
  readonly answered = output<FastingAnswer>();
}
