import { computed, signal, type Signal } from '@angular/core';

export type LoadState = 'loading' | 'shown' | 'failed';

/**
 * What a screen fetched: the last answer stays on the screen while it is fetched again, and when that fails.
 * Answers that were overtaken by a later request are dropped.
 */
export class Loaded<Value> {
  private readonly current = signal<Value | null>(null);
  private readonly problem = signal<Error | null>(null);
  private asked = 0;

  readonly value: Signal<Value | null> = this.current.asReadonly();
  /** Why the last request failed; null when it did not. */
  readonly failure: Signal<Error | null> = this.problem.asReadonly();
  readonly state = computed<LoadState>(() =>
    this.current() !== null ? 'shown' : this.problem() !== null ? 'failed' : 'loading',
  );

  constructor(private readonly fetch: () => Promise<Value>) {}

  async again(): Promise<void> {
    const mine = ++this.asked;
    try {
      const value = await this.fetch();
      if (mine !== this.asked) return;
      this.current.set(value);
      this.problem.set(null);
    } catch (error) {
      if (mine === this.asked)
        this.problem.set(error instanceof Error ? error : new Error(String(error)));
    }
  }

  /** Takes over an answer that came with a change. */
  show(value: Value): void {
    this.asked += 1;
    this.current.set(value);
    this.problem.set(null);
  }
}
