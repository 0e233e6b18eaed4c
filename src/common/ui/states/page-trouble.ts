import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { PictureMark } from '../picture/picture-mark';

/** What went wrong, what it means and what to do next; nothing that was typed is lost. */
@Component({
  selector: 'td-page-trouble',
  imports: [PictureMark],
  templateUrl: './page-trouble.html',
  host: { class: 'trouble', role: 'alert' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PageTrouble {
  readonly kind = input.required<'unreached' | 'signed-out' | 'too-often' | 'refused' | 'broken'>();
  /** The server's own sentence, when it has one for the reader. */
  readonly says = input('');
  /** Number to name on the telephone. */
  readonly reference = input('');
  readonly mayRetry = input(true);
  readonly retry = output();
  protected readonly picture = computed(() => (this.kind() === 'unreached' ? 'again' : 'call-us'));
}
