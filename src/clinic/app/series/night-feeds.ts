import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import type { UsualNightAnswer } from '../../../../shared/contracts/series';

type Night = Omit<UsualNightAnswer, 'childId'>;

const mostFeeds = 6;

/** What one child usually eats in the evening and the night; asked in one line, so that a feed that falls away is named. */
@Component({
  selector: 'td-night-feeds',
  template: `
    <fieldset>
      <legend i18n="@@clinic.plan.night">Usual evening and night of {{ name() }}</legend>
      <label>
        <ng-container i18n="@@clinic.plan.last-meal">Last meal</ng-container>
        <input
          #meal
          type="time"
          [value]="night().lastMealTime ?? ''"
          (change)="tell({ lastMealTime: meal.value || null })"
        />
      </label>
      @for (feed of night().nightFeedTimes; track $index) {
        <span class="feed">
          <label>
            <ng-container i18n="@@clinic.plan.night-feed">Feed in the night</ng-container>
            <input #time type="time" [value]="feed" (change)="feedAt($index, time.value)" />
          </label>
          <button
            class="do"
            type="button"
            (click)="feedAt($index, '')"
            i18n="@@clinic.plan.no-feed"
          >
            Remove
          </button>
        </span>
      }
      @if (night().nightFeedTimes.length < most) {
        <label>
          <ng-container i18n="@@clinic.plan.add-feed">One more feed at</ng-container>
          <input
            #more
            type="time"
            (change)="feedAt(night().nightFeedTimes.length, more.value); more.value = ''"
          />
        </label>
      }
    </fieldset>
  `,
  styles: `
    fieldset {
      display: flex;
      flex-wrap: wrap;
      gap: var(--space-2) var(--space-4);
      align-items: end;
      min-width: 0;
      padding: 0;
      border: 0;
    }
    legend {
      padding: 0 0 0.2rem;
      font-weight: 700;
    }
    label {
      display: grid;
      color: var(--text-soft);
      font-size: var(--step--1);
    }
    input {
      color: var(--text);
      font-size: var(--step-0);
    }
    .feed {
      display: flex;
      gap: var(--space-1);
      align-items: end;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NightFeeds {
  readonly name = input.required<string>();
  readonly night = input.required<Night>();
  readonly told = output<Night>();

  protected readonly most = mostFeeds;

  protected tell(change: Partial<Night>): void {
    this.told.emit({ ...this.night(), ...change });
  }

  /** An empty time takes the feed away. */
  protected feedAt(index: number, time: string): void {
    const times = [...this.night().nightFeedTimes];
    if (time === '') times.splice(index, 1);
    else times[index] = time;
    this.tell({ nightFeedTimes: [...new Set(times)].sort() });
  }
}
