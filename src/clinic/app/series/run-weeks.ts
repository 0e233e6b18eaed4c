import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { ProposedRun, SeriesProposal } from '../../../../shared/contracts/series';
import { weekdayOf, addDays } from '../../../../shared/domain/day';
import { DayPipe } from '../../../common/ui/clinic-times';

type PlanDay = SeriesProposal['days'][number];

interface Week {
  readonly monday: string;
  readonly days: readonly { readonly column: number; readonly day: PlanDay }[];
  readonly runs: readonly { readonly run: ProposedRun; readonly column: number }[];
}

/** Weeks as lines of days; a run lies under the days it takes, as suns on one horizon. Weekends without places are left out. */
@Component({
  selector: 'td-run-weeks',
  imports: [DayPipe],
  templateUrl: './run-weeks.html',
  styleUrl: './run-weeks.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RunWeeks {
  readonly days = input.required<readonly PlanDay[]>();
  readonly runs = input.required<readonly ProposedRun[]>();
  readonly chosen = input<ProposedRun | null>(null);
  readonly choose = output<ProposedRun>();

  protected readonly weeks = computed<Week[]>(() => {
    const mondays = [...new Set(this.days().map((day) => mondayOf(day.on)))];
    return mondays.map((monday) => ({
      monday,
      days: this.days()
        .filter((day) => mondayOf(day.on) === monday && isShown(day))
        .map((day) => ({ column: weekdayOf(day.on), day })),
      runs: this.runs()
        .filter((run) => mondayOf(run.days[0]?.on ?? monday) === monday)
        .map((run) => ({ run, column: weekdayOf(run.days[0]?.on ?? monday) })),
    }));
  });

  protected seats(day: PlanDay): readonly ('taken' | 'free')[] {
    return Array.from({ length: day.placesInAll }, (_seat, index) =>
      index < day.placesInAll - day.placesLeft ? 'taken' : 'free',
    );
  }

  protected times(run: ProposedRun, on: string): string {
    const day = run.days.find((one) => one.on === on);
    return (day?.places ?? []).map((place) => place.arrivalTime).join(', ');
  }
}

const mondayOf = (on: string): string => addDays(on, 1 - weekdayOf(on));

/** A weekend on which the clinic never opens needs no column of its own. */
const isShown = (day: PlanDay): boolean =>
  weekdayOf(day.on) <= 5 || !day.refused.some((reason) => reason.code === 'not-a-clinic-day');
