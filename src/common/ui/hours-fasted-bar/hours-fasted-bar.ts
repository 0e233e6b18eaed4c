import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Instant } from '../../../../shared/domain/zone';
import { clockIn } from '../clinic-times';
import type { RulerScale } from '../ruler/ruler-scale';
import { barGeometry, type BarFacts, type BarStop } from './bar-geometry';

/**
 * From the last intake to the likely collection, with the least and the longest hours of the child's protocol; after
 * the collection the same line carries the specimen to its stops. `--minute` and `--now` come from the sheet's ruler.
 * Hidden from assistive technology: the words beside it say it all.
 */
@Component({
  selector: 'td-hours-fasted-bar',
  templateUrl: './hours-fasted-bar.html',
  styleUrl: './hours-fasted-bar.scss',
  host: {
    class: 'bar',
    'aria-hidden': 'true',
    '[class.is-near]': 'isNear()',
    '[class.is-planned]': 'facts().isPlanOnly',
    '[class.is-unsure]': 'facts().isUnsure',
    '[class.is-spent]': 'isSpent()',
    '[style.--from]': 'geometry().from',
    '[style.--to]': 'geometry().to',
    '[style.--least]': 'geometry().least',
    '[style.--longest]': 'geometry().longest',
    '[style.--until]': 'geometry().until',
  },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class HoursFastedBar {
  readonly facts = input.required<BarFacts>();
  readonly scale = input.required<RulerScale>();
  readonly zone = input.required<string>();
  readonly now = input.required<Instant>();
  /** In the last half hour before the longest fast, and after it. */
  readonly isNear = input(false);
  readonly stops = input<readonly BarStop[]>([]);

  protected readonly isSpent = computed(() => this.facts().collectedAt !== null);
  protected readonly geometry = computed(() =>
    barGeometry(this.facts(), { scale: this.scale(), now: this.now(), stops: this.stops() }),
  );

  protected clock(at: string): string {
    return clockIn(at, this.zone());
  }
}
