import {
  ChangeDetectionStrategy,
  Component,
  LOCALE_ID,
  computed,
  inject,
  input,
  output,
} from '@angular/core';
import { RouterLink } from '@angular/router';
import type { MorningQuestion } from '../../../../shared/contracts/family-morning';
import type { FamilySession } from '../../../../shared/contracts/family-session';
import type { WaitingAnswer } from '../../../common/session/family-answers';
import { phoneTime } from '../../../common/ui/night-path/short-time';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { ChildFace } from '../../../common/ui/picture/child-face';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { isAllNothing, toldUs } from './answer-sheet';

/** The answer is on this phone and nowhere else. A dashed edge, and never the word 'come'. */
@Component({
  selector: 'td-saved-slab',
  imports: [ChildFace, PageHeading, PictureMark, RouterLink],
  templateUrl: './saved-slab.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SavedSlab {
  private readonly locale = inject(LOCALE_ID);
  readonly question = input.required<MorningQuestion>();
  readonly waiting = input.required<WaitingAnswer>();
  readonly lanes = input.required<ReadonlyMap<number, number>>();
  readonly clinic = input<FamilySession['clinic'] | null>(null);
  readonly isSending = input(false);
  readonly isSignedOut = input(false);
  readonly sendAgain = output();
  readonly changeAnswer = output();

  protected readonly told = computed(() => {
    const waiting = this.waiting();
    return waiting.kind === 'check' ? toldUs(this.question(), waiting.request) : [];
  });
  /** '1' by text says 'nothing' for every child: offered only when that is what was answered. */
  protected readonly mayText = computed(() => {
    const waiting = this.waiting();
    return waiting.kind === 'check' && isAllNothing(waiting.request);
  });
  protected readonly isIll = computed(() => {
    const waiting = this.waiting();
    return waiting.kind === 'change' && waiting.request.kind === 'ill';
  });
  protected readonly answeredAt = computed(() =>
    phoneTime(this.waiting().request.deviceAt, this.locale, false),
  );
}
