import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import { auditTime, filter } from 'rxjs';
import { AlertsClient } from '../../../common/api/clinic/alerts-client';
import { LiveClient } from '../../../common/api/clinic/live-client';

/** What nobody has taken yet, in one line on every screen. What it could not ask it does not claim. */
@Component({
  selector: 'td-alerts-strip',
  imports: [RouterLink],
  template: `<div role="status">
    @if (waiting() > 0) {
      <p>
        <a routerLink="/alerts" i18n="@@clinic.alerts.strip">{waiting(), plural,
          one {One alert waits for a person}
          other {{{ waiting() }} alerts wait for a person}
        }</a>
      </p>
    }
  </div>`,
  styles: `
    p {
      margin: 0;
      padding: 0 var(--edge);
      background: var(--care-soft);
      border-block-end: var(--rule);
      font-weight: 700;
    }
    a {
      display: inline-flex;
      align-items: center;
      min-height: var(--control);
      color: var(--text);
    }
    @media print {
      :host {
        display: none;
      }
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AlertsStrip {
  private readonly client = inject(AlertsClient);
  protected readonly waiting = signal(0);

  constructor() {
    void this.ask();
    inject(LiveClient)
      .news.pipe(
        filter(({ topic }) => topic === 'alerts' || topic === 'opened'),
        auditTime(300),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.ask());
  }

  private async ask(): Promise<void> {
    try {
      const { alerts } = await this.client.list();
      this.waiting.set(
        alerts.filter(({ takenBy, endedAt }) => takenBy === null && endedAt === null).length,
      );
    } catch {
      // The screen itself says that the server does not answer.
    }
  }
}
