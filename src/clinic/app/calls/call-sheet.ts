import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  computed,
  inject,
  input,
  linkedSignal,
  output,
} from '@angular/core';
import { RouterLink } from '@angular/router';
import type { CallDoneRequest, CallTask } from '../../../../shared/contracts/calls';
import type { ClinicFailure } from '../../../common/api/clinic/clinic-http';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { PhonePipe } from '../../../common/ui/phone-words';
import { StateMark } from '../../../common/ui/state-mark/state-mark';
import {
  firstTaps,
  needsInterpreterName,
  outcomeRequest,
  secondTaps,
  type FirstTap,
  type SecondTap,
} from './call-outcome';
import { callMark } from './call-words';

/** One call: interpreter first, whom to call, what to say, and what happened in two taps. */
@Component({
  selector: 'td-call-sheet',
  imports: [MomentPipe, PhonePipe, RouterLink, StateMark],
  templateUrl: './call-sheet.html',
  styleUrl: './call-sheet.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CallSheet {
  private readonly element = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly call = input.required<CallTask>();
  readonly zone = input.required<string>();
  readonly me = input('');
  readonly mayWrite = input(false);
  readonly mayOpenChild = input(false);
  readonly isBusy = input(false);
  readonly failure = input<ClinicFailure | null>(null);
  readonly claim = output<void>();
  readonly done = output<CallDoneRequest>();

  protected readonly firstTaps = firstTaps;
  private readonly callId = computed(() => this.call().id);
  /** A new call begins with nothing tapped; the same call keeps what was typed, whatever arrives meanwhile. */
  protected readonly first = linkedSignal<number, FirstTap | null>({
    source: this.callId,
    computation: () => null,
  });
  protected readonly interpreter = linkedSignal({ source: this.callId, computation: () => '' });
  protected readonly note = linkedSignal({ source: this.callId, computation: () => '' });
  protected readonly isNameMissing = linkedSignal({
    source: this.callId,
    computation: () => false,
  });
  protected readonly seconds = computed<readonly SecondTap[]>(() => {
    const first = this.first();
    return first === null ? [] : secondTaps[first];
  });
  protected readonly mark = computed(() => callMark(this.call().reason));
  protected readonly isMine = computed(() => this.call().claimedBy === this.me());

  protected finish(second: SecondTap): void {
    const needsInterpreter = this.call().familyMember?.needsInterpreter ?? false;
    if (
      needsInterpreterName(second.outcome, needsInterpreter) &&
      this.interpreter().trim() === ''
    ) {
      this.isNameMissing.set(true);
      this.element.nativeElement.querySelector<HTMLElement>('#interpreter-name')?.focus();
      return;
    }
    this.done.emit(outcomeRequest(second, { interpreter: this.interpreter(), note: this.note() }));
  }
}
