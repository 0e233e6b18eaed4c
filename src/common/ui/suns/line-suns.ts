import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';

type Sun = 'done' | 'next' | 'later' | 'lost';
const step = 20;

/** The mornings of a series in a line of text: discs on one horizon, as many as are planned. The words stand beside. */
@Component({
  selector: 'td-line-suns',
  template: `<svg
    [attr.viewBox]="'0 0 ' + width() + ' 18'"
    [style.width.rem]="width() / 19.4"
    focusable="false"
  >
    @for (disc of discs(); track $index) {
      @switch (disc.sun) {
        @case ('done') {
          <circle class="done" [attr.cx]="disc.x" cy="8" r="5.5" />
        }
        @case ('next') {
          <path class="next" [attr.d]="'M' + (disc.x - 5.5) + ' 14.5a5.5 5.5 0 0 1 11 0Z'" />
        }
        @case ('later') {
          <path class="later" [attr.d]="'M' + (disc.x - 5.5) + ' 14.5a5.5 5.5 0 0 0 11 0'" />
        }
        @case ('lost') {
          <circle class="lost" [attr.cx]="disc.x" cy="7" r="4.5" />
          <path
            class="cloud"
            [attr.d]="
              'M' +
              (disc.x - 6) +
              ' 13a2.6 2.6 0 0 1 .6-5.1 3.8 3.8 0 0 1 7.2-.6 3 3 0 0 1 3.4 5.7z'
            "
          />
        }
      }
    }
    <path class="horizon" [attr.d]="'M0 14.5h' + width()" />
  </svg>`,
  styles: `
    :host {
      display: inline-block;
      margin-inline: 0.35em 0.25em;
      vertical-align: -0.1em;
    }
    svg {
      display: block;
      height: 0.93rem;
    }
    .done {
      fill: var(--sun);
    }
    .next {
      fill: var(--sun-next);
      stroke: var(--sun);
    }
    .later {
      fill: none;
      stroke: var(--horizon);
      stroke-width: 1.6;
    }
    .lost {
      fill: var(--sun-next);
      opacity: 0.6;
    }
    .cloud {
      fill: var(--sheet);
      stroke: var(--horizon);
      stroke-width: 1.2;
    }
    .horizon {
      fill: none;
      stroke: var(--horizon);
      stroke-width: 1.4;
    }
  `,
  host: { 'aria-hidden': 'true' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LineSuns {
  readonly suns = input.required<readonly Sun[]>();
  protected readonly width = computed(() => Math.max(this.suns().length, 1) * step);
  protected readonly discs = computed(() =>
    this.suns().map((sun, index) => ({ sun, x: index * step + step / 2 })),
  );
}
