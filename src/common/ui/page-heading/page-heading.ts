import { DOCUMENT, Directive, ElementRef, Injectable, effect, inject, input } from '@angular/core';

/** Knows at which heading the reader stands: the first page keeps the browser's own focus. */
@Injectable({ providedIn: 'root' })
export class HeadingFocus {
  private lastKey: string | null = null;
  private hasMoved = false;

  /** 'new' for another page; 'again' for the same heading drawn anew, once it had been given focus. */
  arriveAt(key: string): 'new' | 'again' | 'first' {
    if (this.lastKey !== null && this.lastKey !== key) this.hasMoved = true;
    const isSame = this.lastKey === key;
    this.lastKey = key;
    if (!this.hasMoved) return 'first';
    return isSame ? 'again' : 'new';
  }
}

/** The page's heading: takes focus when it is new, so that a screen reader begins there. */
@Directive({
  selector: 'h1[tdPageHeading]',
  host: { id: 'title', tabindex: '-1' },
})
export class PageHeading {
  private readonly heading = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;
  private readonly document = inject(DOCUMENT);
  /** What the heading stands for: another key is another page. */
  readonly tdPageHeading = input.required<string>();

  constructor() {
    const focus = inject(HeadingFocus);
    effect(() => {
      const arrival = focus.arriveAt(this.tdPageHeading());
      if (arrival === 'first') return;
      queueMicrotask(() => this.take(arrival));
    });
  }

  private take(arrival: 'new' | 'again'): void {
    // Content that replaces a skeleton takes the heading's focus with it; nobody else's is taken.
    if (arrival === 'again' && this.document.activeElement !== this.document.body) return;
    this.heading.focus({ preventScroll: true });
    if (arrival === 'new') this.document.defaultView?.scrollTo({ top: 0 });
  }
}
