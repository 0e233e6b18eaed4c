import {
  ChangeDetectionStrategy,
  Component,
  LOCALE_ID,
  computed,
  inject,
  input,
} from '@angular/core';
import type { NextMorning } from '../../../../shared/contracts/family-morning';
import { shortDay } from '../night-path/short-time';

type Sun = NextMorning['suns'][number];

/** The planned mornings as discs on one horizon, each with its word and its day. */
@Component({
  selector: 'td-horizon-suns',
  templateUrl: './horizon-suns.html',
  host: { class: 'band' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class HorizonSuns {
  private readonly locale = inject(LOCALE_ID);
  readonly suns = input.required<readonly Sun[]>();
  /** 'Morning 2 of 3' */
  readonly says = input.required<string>();
  /** Calendar days in the order of the suns; may be shorter. */
  readonly days = input<readonly string[]>([]);

  protected readonly mornings = computed(() =>
    this.suns().map((sun, index) => {
      const day = this.days()[index];
      return { sun, day: day ? shortDay(day, this.locale) : '' };
    }),
  );
}
