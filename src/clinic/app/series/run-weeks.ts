import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { ProposedDay, ProposedRun } from '../../../../shared/contracts/series';
import { addDays, weekdayOf } from '../../../../shared/domain/day';
import { DayPipe } from '../../../common/ui/clinic-times';

interface RunLine {
  readonly run: ProposedRun;
  /** The column of each day of the run that lies in this week. */
  readonly columns: readonly {
    readonly column: number;
    readonly on: string;
    readonly times: string;
  }[];
  /** Days of the run after this week. */
  readonly later: readonly { readonly on: string; readonly times: string }[];
}

interface Week {
  readonly monday: string;
  readonly lastDay: string;
  readonly days: readonly { readonly column: number; readonly day: ProposedDay }[];
  readonly runs: readonly RunLine[];
}

let made = 0;

/** Weeks as lines of days; a run lies under the days it takes, as suns on one horizon. Weekends without places are left out. */
@Component({
  selector: 'td-run-weeks',
  imports: [DayPipe],
  templateUrl: './run-weeks.html',
  styleUrl: './run-weeks.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[style.--columns]': 'columns()' },
})
export class RunWeeks {
  readonly days = input.required<readonly ProposedDay[]>();
  readonly runs = input.required<readonly ProposedRun[]>();
  readonly chosen = input<ProposedRun | null>(null);
  readonly choose = output<ProposedRun>();

  protected readonly group = `run-${(made += 1)}`;
  private readonly shown = computed(() => this.days().filter(isShown));
  protected readonly columns = computed(() =>
    Math.max(5, ...this.shown().map((day) => weekdayOf(day.on))),
  );
  protected readonly weeks = computed<Week[]>(() =>
    [...new Set(this.shown().map((day) => mondayOf(day.on)))].map((monday) => ({
      monday,
      lastDay: addDays(monday, this.columns() - 1),
      days: this.shown()
        .filter((day) => mondayOf(day.on) === monday)
        .map((day) => ({ column: weekdayOf(day.on), day })),
      runs: this.runs()
        .filter((run) => mondayOf(run.days[0]?.on ?? '') === monday)
        .map((run) => lineOf(run, monday)),
    })),
  );

  protected seats(day: ProposedDay): readonly ('taken' | 'free')[] {
    return Array.from({ length: day.placesInAll }, (_seat, index) =>
      index < day.placesInAll - day.placesLeft ? 'taken' : 'free',
    );
  }

  protected span({ columns }: RunLine): string {
    return `${columns[0]?.column ?? 1} / ${(columns.at(-1)?.column ?? 1) + 1}`;
  }
}

function lineOf(run: ProposedRun, monday: string): RunLine {
  const days = run.days.map(({ on, places }) => ({
    on,
    times: places.map(({ arrivalTime }) => arrivalTime).join(', '),
  }));
  return {
    run,
    columns: days
      .filter(({ on }) => mondayOf(on) === monday)
      .map((day) => ({ ...day, column: weekdayOf(day.on) })),
    later: days.filter(({ on }) => mondayOf(on) !== monday),
  };
}

const mondayOf = (on: string): string => (on === '' ? '' : addDays(on, 1 - weekdayOf(on)));

/** A weekend on which the clinic never opens needs no column of its own. */
const isShown = (day: ProposedDay): boolean =>
  weekdayOf(day.on) <= 5 || !day.refused.some((reason) => reason.code === 'not-a-clinic-day');
