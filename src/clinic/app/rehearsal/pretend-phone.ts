import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  afterRenderEffect,
  computed,
  effect,
  input,
  linkedSignal,
  output,
  untracked,
  viewChild,
} from '@angular/core';
import type { RehearsalState } from '../../../../shared/contracts/rehearsal';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { PhonePipe } from '../../../common/ui/phone-words';
import { PretendText } from './pretend-text';

type Phone = RehearsalState['phones'][number];

/** One pretended phone: its texts, oldest first, and a box to answer. */
@Component({
  selector: 'td-pretend-phone',
  imports: [MomentPipe, PhonePipe, PretendText],
  templateUrl: './pretend-phone.html',
  styleUrl: './pretend-phone.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PretendPhone {
  readonly phone = input.required<Phone>();
  readonly zone = input.required<string>();
  readonly isBusy = input(false);
  /** Grows when a text was kept. */
  readonly sent = input(0);
  readonly reply = output<string>();

  private readonly list = viewChild.required<ElementRef<HTMLElement>>('list');
  protected readonly digits: readonly string[] = ['1', '2', '3'];
  private readonly number = computed(() => this.phone().phone);
  protected readonly draft = linkedSignal({ source: this.number, computation: () => '' });
  protected readonly texts = computed(() =>
    [...this.phone().texts].sort((a, b) => a.at.localeCompare(b.at)),
  );

  constructor() {
    // Like on any phone the newest text is the one that is seen.
    afterRenderEffect(() => {
      this.texts();
      const list = this.list().nativeElement;
      list.scrollTop = list.scrollHeight;
    });
    effect(() => {
      this.sent();
      untracked(() => this.draft.set(''));
    });
  }

  protected send(event: Event): void {
    event.preventDefault();
    const body = this.draft().trim();
    if (body !== '') this.reply.emit(body);
  }
}
