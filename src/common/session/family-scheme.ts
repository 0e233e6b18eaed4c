import { DOCUMENT, Injectable, inject, signal } from '@angular/core';

export type Scheme = 'device' | 'light' | 'dark';
const KEY = 'threedawn-scheme';

/** Light or dark as the device says, unless the reader chose. */
@Injectable({ providedIn: 'root' })
export class FamilyScheme {
  private readonly document = inject(DOCUMENT);
  private readonly chosen = signal<Scheme>('device');
  readonly scheme = this.chosen.asReadonly();

  /** Called before the first screen is drawn, so that no wrong colour is seen. */
  begin(): void {
    this.apply(this.kept());
  }

  choose(scheme: Scheme): void {
    this.apply(scheme);
    try {
      this.document.defaultView?.localStorage.setItem(KEY, scheme);
    } catch {
      // A browser that keeps nothing: the choice holds until the page is closed.
    }
  }

  private apply(scheme: Scheme): void {
    this.chosen.set(scheme);
    const root = this.document.documentElement;
    if (scheme === 'device') root.removeAttribute('data-scheme');
    else root.setAttribute('data-scheme', scheme);
  }

  private kept(): Scheme {
    try {
      const kept = this.document.defaultView?.localStorage.getItem(KEY);
      return kept === 'light' || kept === 'dark' ? kept : 'device';
    } catch {
      return 'device';
    }
  }
}
