import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { CalendarFeedClient } from '../../../common/api/family/calendar-feed-client';
import { familyFailure } from '../../../common/api/family/family-failure';

/** An address that the phone's calendar follows by itself, until the family takes it back. */
@Component({
  selector: 'td-follow-calendar',
  template: `
    <h2 i18n="@@family.feed.heading">A calendar that follows</h2>
    <p i18n="@@family.feed.says">
      Your calendar can follow your visits by itself. It shows only “clinic visit” and the time.
    </p>
    @if (url(); as address) {
      <p>
        <a class="button button-full" [href]="follow()" i18n="@@family.feed.follow"
          >Follow on this phone</a
        >
      </p>
      <p class="hint">
        <bdi dir="ltr">{{ address }}</bdi>
      </p>
      <button
        class="button button-full"
        type="button"
        [disabled]="isBusy()"
        (click)="withdraw()"
        i18n="@@family.feed.withdraw"
      >
        Take the address back
      </button>
    } @else {
      <button
        class="button button-full"
        type="button"
        [disabled]="isBusy()"
        (click)="open()"
        i18n="@@family.feed.open"
      >
        Give me an address
      </button>
    }
    <p class="hint" role="status">{{ trouble() }}</p>
  `,
  styles: `
    bdi {
      overflow-wrap: anywhere;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FollowCalendar {
  private readonly client = inject(CalendarFeedClient);
  protected readonly url = signal<string | null>(null);
  protected readonly isBusy = signal(false);
  protected readonly trouble = signal('');
  /** Calendars on phones open this scheme. */
  protected readonly follow = computed(() => (this.url() ?? '').replace(/^https?:/, 'webcal:'));

  constructor() {
    void this.doing(() => this.client.feed());
  }

  protected open(): Promise<void> {
    return this.doing(() => this.client.open());
  }

  protected withdraw(): Promise<void> {
    return this.doing(() => this.client.withdraw());
  }

  private async doing(work: () => Promise<{ readonly url: string | null }>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.trouble.set('');
    try {
      this.url.set((await work()).url);
    } catch (error) {
      this.trouble.set(familyFailure(error).problem?.title ?? '');
    } finally {
      this.isBusy.set(false);
    }
  }
}
