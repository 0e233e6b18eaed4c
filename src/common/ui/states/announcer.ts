import { ChangeDetectionStrategy, Component, Injectable, inject, signal } from '@angular/core';

/** Says something aloud to those who do not see the page change. */
@Injectable({ providedIn: 'root' })
export class Announcer {
  private readonly words = signal('');
  readonly said = this.words.asReadonly();

  say(words: string): void {
    this.words.set('');
    // An unchanged live region is not read again: empty first, then speak.
    setTimeout(() => this.words.set(words), 50);
  }
}

@Component({
  selector: 'td-live-region',
  template: `{{ announcer.said() }}`,
  host: { class: 'away', 'aria-live': 'polite', role: 'status' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LiveRegion {
  protected readonly announcer = inject(Announcer);
}
