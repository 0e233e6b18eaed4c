import {
  ChangeDetectionStrategy,
  Component,
  DOCUMENT,
  effect,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import {
  pastedDate,
  readBirthDate,
  type DateField,
  type DateParts,
  type ReadDate,
} from './birth-date';

/** A child's birth date in three labelled fields; a pasted date fills all three. */
@Component({
  selector: 'td-birth-date-form',
  imports: [PictureMark],
  templateUrl: './birth-date-form.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BirthDateForm {
  private readonly document = inject(DOCUMENT);
  readonly today = input.required<string>();
  readonly isMonthFirst = input(false);
  readonly isBusy = input(false);
  /** Set when the clinic did not know the date. */
  readonly wrongDate = input<{ triesLeft: number | null } | null>(null);
  readonly entered = output<{ bornOn: string; isRemembered: boolean }>();

  protected readonly parts = signal<DateParts>({ day: '', month: '', year: '' });
  protected readonly isRemembered = signal(false);
  protected readonly wrong = signal<Extract<ReadDate, { wrong: string }> | null>(null);

  constructor() {
    effect(() => {
      if (this.wrongDate() !== null) this.focus('day');
    });
  }

  protected fieldsInOrder(): DateField[] {
    return this.isMonthFirst() ? ['month', 'day', 'year'] : ['day', 'month', 'year'];
  }

  protected type(field: DateField, text: string): void {
    this.parts.update((parts) => ({ ...parts, [field]: text }));
  }

  protected paste(event: ClipboardEvent): void {
    const whole = pastedDate(event.clipboardData?.getData('text') ?? '', this.isMonthFirst());
    if (whole === null) return;
    event.preventDefault();
    this.parts.set(whole);
  }

  protected isWrong(field: DateField): boolean {
    return this.wrong()?.field === field || this.wrongDate() !== null;
  }

  protected submit(event: Event): void {
    event.preventDefault();
    if (this.isBusy()) return;
    const read = readBirthDate(this.parts(), this.today());
    if ('wrong' in read) {
      this.wrong.set(read);
      this.focus(read.field);
      return;
    }
    this.wrong.set(null);
    this.entered.emit({ bornOn: read.bornOn, isRemembered: this.isRemembered() });
  }

  private focus(field: DateField): void {
    queueMicrotask(() => this.document.getElementById(`born-${field}`)?.focus());
  }
}
