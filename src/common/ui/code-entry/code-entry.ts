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
import { PictureMark } from '../picture/picture-mark';

/** Six digits of any script, spaces and dashes between them allowed; null when it is something else. */
export function readCode(text: string): string | null {
  const digits = text.replace(/[\s-]/g, '');
  return /^\d{6}$/.test(digits) ? digits : null;
}

/** The code from the text or e-mail. Paste is allowed, and phones offer it by themselves. */
@Component({
  selector: 'td-code-entry',
  imports: [PictureMark],
  templateUrl: './code-entry.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CodeEntry {
  private readonly document = inject(DOCUMENT);
  /** 'text to ...0142' */
  readonly sentTo = input('');
  readonly isBusy = input(false);
  /** The server's sentence about a code that it did not take. */
  readonly refusal = input('');
  readonly triesLeft = input<number | null>(null);
  readonly asksToRemember = input(false);
  readonly entered = output<{ code: string; isRemembered: boolean }>();
  readonly sendAgain = output();

  protected readonly code = signal('');
  protected readonly isRemembered = signal(false);
  protected readonly isShort = signal(false);

  constructor() {
    effect(() => {
      if (this.refusal()) this.focus();
    });
  }

  protected submit(event: Event): void {
    event.preventDefault();
    if (this.isBusy()) return;
    const code = readCode(this.code());
    this.isShort.set(code === null);
    if (code === null) this.focus();
    else this.entered.emit({ code, isRemembered: this.isRemembered() });
  }

  private focus(): void {
    queueMicrotask(() => this.document.getElementById('code')?.focus());
  }
}
