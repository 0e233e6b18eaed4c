import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { ReplanProposal } from '../../../../shared/contracts/replan';
import { DayPipe } from '../../../common/ui/clinic-times';
import { LineSuns } from '../../../common/ui/suns/line-suns';
import { stateSays } from './replan-words';

type Child = ReplanProposal['children'][number];

/** How the series stands: each child's mornings, and planned days of the household to tick that are to move. */
@Component({
  selector: 'td-standing-series',
  imports: [DayPipe, LineSuns],
  template: `
    @for (child of children(); track child.seriesId) {
      <section>
        <h3>{{ child.fullName }}</h3>
        <p>
          <td-line-suns [suns]="suns(child)" />
          <ng-container i18n="@@clinic.replan.standing"
            >{{ child.collected }} of {{ child.morningsPlanned }} collected</ng-container
          >
          @if (child.missing > 0) {
            <b class="is-care" i18n="@@clinic.replan.missing">
              {child.missing, plural,
                one {; 1 morning is missing}
                other {; {{ child.missing }} mornings are missing}
              }</b
            >
          }
        </p>
        <ol>
          @for (morning of child.mornings; track morning.morningId) {
            <li [class.is-lost]="morning.state === 'lost' || morning.state === 'not-collected'">
              <b>{{ morning.number }}</b>
              <span>
                <span class="on">{{ morning.on | tdDay }}, {{ morning.arrivalTime }}</span>
                {{ stateSays[morning.state] }}
                @if (morning.lostReason) {
                  <span class="told">({{ morning.lostReason }})</span>
                }
              </span>
            </li>
          }
        </ol>
      </section>
    }
    @if (plannedDays().length > 0) {
      <fieldset>
        <legend i18n="@@clinic.replan.move-which">Move to other days or times</legend>
        <div class="taps">
          @for (day of plannedDays(); track day.on) {
            <label class="tap">
              <input
                #isMoved
                type="checkbox"
                [checked]="isTicked(day.ids)"
                (change)="tick(day.ids, isMoved.checked)"
              />
              {{ day.on | tdDay }}
            </label>
          }
        </div>
      </fieldset>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: var(--space-3);
    }
    h3 {
      font-size: var(--step-0);
    }
    li {
      display: flex;
      gap: var(--space-2);
    }
    li b {
      min-width: 1ch;
      font-variant-numeric: tabular-nums;
    }
    .is-lost .on {
      text-decoration: line-through;
    }
    fieldset {
      min-width: 0;
      padding: 0;
      border: 0;
    }
    legend {
      padding: 0 0 0.25rem;
      font-weight: 700;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StandingSeries {
  readonly children = input.required<readonly Child[]>();
  readonly movedIds = input<readonly number[]>([]);
  readonly moved = output<readonly number[]>();

  protected readonly stateSays = stateSays;
  /** Days on which mornings are planned, with those of all the children. */
  protected readonly plannedDays = computed(() => {
    const planned = this.children().flatMap(({ mornings }) =>
      mornings.filter(({ state }) => state === 'planned'),
    );
    return [...new Set(planned.map(({ on }) => on))].sort().map((on) => ({
      on,
      ids: planned.filter((one) => one.on === on).map(({ morningId }) => morningId),
    }));
  });

  protected suns({ mornings }: Child) {
    const next = mornings.find(({ state }) => state === 'planned')?.morningId;
    return mornings.map(({ state, morningId }) => {
      if (state === 'collected') return 'done' as const;
      if (state === 'lost' || state === 'not-collected') return 'lost' as const;
      return morningId === next ? ('next' as const) : ('later' as const);
    });
  }

  protected isTicked(ids: readonly number[]): boolean {
    return ids.every((id) => this.movedIds().includes(id));
  }

  protected tick(ids: readonly number[], isMoved: boolean): void {
    const others = this.movedIds().filter((id) => !ids.includes(id));
    this.moved.emit(isMoved ? [...others, ...ids] : others);
  }
}
