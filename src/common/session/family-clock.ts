import { DestroyRef, Injectable, inject, signal } from '@angular/core';
import { FamilyPhone } from './family-phone';

const OFFSET = 'clock-offset';
const TICK_MS = 10_000;

/**
 * The clinic's clock as this phone knows it: an old phone can be minutes wrong, and every answer of the server says
 * what time it is. Kept, so that it also holds with no signal.
 */
@Injectable({ providedIn: 'root' })
export class FamilyClock {
  private readonly phone = inject(FamilyPhone);
  private offsetMs = 0;
  private readonly tick = signal(Date.now());
  /** Epoch milliseconds; moves on by itself. */
  readonly now = this.tick.asReadonly();

  constructor() {
    const timer = setInterval(() => this.show(), TICK_MS);
    inject(DestroyRef).onDestroy(() => clearInterval(timer));
    void this.phone.read<number>(OFFSET).then((kept) => {
      if (kept !== null && this.offsetMs === 0) this.offsetMs = kept;
      this.show();
    });
  }

  /** @param instant the server's 'now' from an answer that has just come */
  learn(instant: string): void {
    this.offsetMs = Date.parse(instant) - Date.now();
    this.show();
    void this.phone.keep(OFFSET, this.offsetMs);
  }

  instant(): string {
    return new Date(this.show()).toISOString();
  }

  private show(): number {
    const now = Date.now() + this.offsetMs;
    this.tick.set(now);
    return now;
  }
}
