import { ChangeDetectionStrategy, Component, DestroyRef, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import { MessagesClient } from '../../../common/api/clinic/messages-client';
import { StateMark } from '../../../common/ui/state-mark/state-mark';

const askEveryMs = 60_000;

/**
 * "Texts are not going out", on every screen while it is so. Asked every minute: a sender that stands still announces
 * nothing. What it could not ask it does not claim.
 */
@Component({
  selector: 'td-outbox-alarm',
  imports: [RouterLink, StateMark],
  template: `<div role="alert">
    @if (says(); as words) {
      <p>
        <td-state-mark name="ceiling" /> {{ words }}
        <a routerLink="/calls" i18n="@@clinic.alarm.calls">Calls to make</a>
        <a routerLink="/messages" [queryParams]="{ show: 'waiting' }" i18n="@@clinic.alarm.messages"
          >What waits</a
        >
      </p>
    }
  </div>`,
  styles: `
    p {
      display: flex;
      flex-wrap: wrap;
      align-items: center;
      gap: var(--space-1) var(--space-3);
      margin: 0;
      padding: var(--space-2) var(--edge);
      background: var(--care-soft);
      border-block-end: 3px solid var(--care);
      color: var(--text);
      font-weight: 700;
    }
    a {
      display: inline-flex;
      align-items: center;
      min-height: var(--control);
      color: inherit;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class OutboxAlarm {
  private readonly client = inject(MessagesClient);
  protected readonly says = signal<string | null>(null);

  constructor() {
    void this.ask();
    const timer = setInterval(() => void this.ask(), askEveryMs);
    inject(DestroyRef).onDestroy(() => clearInterval(timer));
  }

  private async ask(): Promise<void> {
    try {
      const { isStuck, says } = await this.client.outbox();
      this.says.set(isStuck ? says : null);
    } catch {
      // The screen itself says that the server does not answer.
    }
  }
}
