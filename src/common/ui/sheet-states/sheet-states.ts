import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Loaded } from '../loaded';
import { StateMark } from '../state-mark/state-mark';

/**
 * Loading, failed with retry, and the last answer with a note when it could not be fetched again. The content stands
 * inside and is shown as soon as there is an answer.
 */
@Component({
  selector: 'td-sheet-states',
  imports: [StateMark],
  template: `
    @switch (loaded().state()) {
      @case ('loading') {
        <div class="waiting" role="status">
          <span class="unseen" i18n="@@ui.states.loading">Loading</span>
          @for (line of lines; track line) {
            <i aria-hidden="true"></i>
          }
        </div>
      }
      @case ('failed') {
        <div class="failed" role="alert">
          <p><td-state-mark name="ceiling" /> {{ loaded().failure()?.message }}</p>
          <button class="do" type="button" (click)="loaded().again()" i18n="@@ui.states.again">
            Try again
          </button>
        </div>
      }
      @default {
        @if (isStale()) {
          <div class="failed" role="status">
            <p>
              <td-state-mark name="late" />&ngsp;<ng-container i18n="@@ui.states.stale"
                >This is the last state we have. The server does not answer; we go on
                trying.</ng-container
              >
            </p>
            <button class="do" type="button" (click)="loaded().again()" i18n="@@ui.states.now">
              Try now
            </button>
          </div>
        }
        <ng-content />
      }
    }
  `,
  styles: `
    :host {
      display: block;
    }
    .waiting {
      display: grid;
      gap: var(--space-3);
      padding-block: var(--space-4);
    }
    i {
      height: 3.5rem;
      border-radius: var(--round-clinic);
      background: var(--sheet-2);
      border: var(--rule);
    }
    i:nth-child(3) {
      opacity: 0.7;
    }
    i:nth-child(4) {
      opacity: 0.4;
    }
    @media (prefers-reduced-motion: no-preference) {
      .waiting {
        animation: breathe 1.6s ease-in-out infinite alternate;
      }
    }
    @keyframes breathe {
      to {
        opacity: 0.5;
      }
    }
    .failed {
      display: flex;
      flex-wrap: wrap;
      align-items: center;
      gap: var(--space-3);
      margin-block-end: var(--space-3);
      padding: var(--space-3) var(--space-4);
      border-inline-start: 4px solid var(--care);
      border-radius: var(--round-clinic);
      background: var(--care-soft);
      color: var(--text);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SheetStates {
  readonly loaded = input.required<Loaded<unknown>>();
  protected readonly lines = [1, 2, 3];
  protected readonly isStale = computed(() => this.loaded().failure() !== null);
}
