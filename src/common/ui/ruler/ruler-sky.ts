import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { RulerScale } from './ruler-scale';

/** The sky over the ruler: four skies, each faded in where its hour begins. */
@Component({
  selector: 'td-ruler-sky',
  template: `
    <i class="night"></i>
    <i class="first-light" [style.--at]="scale().firstLight"></i>
    <i class="day" [style.--at]="scale().day"></i>
    <i class="sun" [style.--at]="scale().day + 25"></i>
  `,
  styles: `
    :host {
      position: relative;
      display: block;
    }
    i {
      position: absolute;
      inset-block: 0;
      right: -60vw;
    }
    i:not(.sun) {
      -webkit-mask-image: linear-gradient(90deg, transparent, black var(--fade));
      mask-image: linear-gradient(90deg, transparent, black var(--fade));
    }
    .night {
      --fade: 10rem;
      left: -8rem;
      background: var(--sky-night);
    }
    .first-light {
      --fade: 6rem;
      left: calc(var(--at) * var(--minute));
      background: var(--sky-first-light);
    }
    .day {
      --fade: 4.5rem;
      left: calc(var(--at) * var(--minute));
      background: var(--sky-morning);
    }
    .sun {
      inset: auto auto -0.5rem calc(var(--at) * var(--minute));
      width: 1rem;
      height: 1rem;
      margin-left: -0.5rem;
      border-radius: 50%;
      background: var(--sun-by-day);
    }
  `,
  host: { 'aria-hidden': 'true' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RulerSky {
  readonly scale = input.required<RulerScale>();
}
