import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';

type Sun = 'done' | 'next' | 'later' | 'lost';
const STEP = 36;

/** The same mornings in the slim sky: discs at the horizon line. The words stand beside. */
@Component({
  selector: 'td-slim-suns',
  template: `<svg
    class="suns"
    [attr.viewBox]="'0 0 ' + width() + ' 40'"
    aria-hidden="true"
    focusable="false"
  >
    @for (disc of discs(); track $index) {
      @switch (disc.sun) {
        @case ('done') {
          <circle class="sun" [attr.cx]="disc.x" cy="18" r="11" />
        }
        @case ('next') {
          <path class="sun" [attr.d]="'M' + (disc.x - 15) + ' 40a15 15 0 0 1 30 0z'" />
        }
        @case ('lost') {
          <circle class="faint" [attr.cx]="disc.x" cy="18" r="11" />
        }
      }
    }
  </svg>`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SlimSuns {
  readonly suns = input.required<readonly Sun[]>();
  protected readonly width = computed(() => Math.max(this.suns().length, 1) * STEP);
  protected readonly discs = computed(() =>
    this.suns().map((sun, index) => ({ sun, x: index * STEP + STEP / 2 })),
  );
}
