import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** A stretch of a room's morning, in minutes on the ruler: in use, closed for its air, or planned. */
export interface LaneStretch {
  readonly kind: 'busy' | 'shut' | 'plan';
  readonly at: number;
  readonly minutes: number;
}

/** A room on the same ruler as the children: solid is in use, outline is planned, hatched is closed. */
@Component({
  selector: 'td-room-lane',
  template: `@for (stretch of stretches(); track $index) {
    <i [class]="stretch.kind" [style.--at]="stretch.at" [style.--for]="stretch.minutes"></i>
  }`,
  styles: `
    :host {
      position: relative;
      display: block;
      height: 1.1rem;
    }
    :host::after {
      content: '';
      position: absolute;
      inset-block: -0.1rem;
      left: calc(var(--now) * var(--minute));
      width: var(--now-width, 2px);
      margin-left: -1px;
      background: var(--rose);
      box-shadow: 0 0 0 1.5px var(--ground);
    }
    i {
      position: absolute;
      inset-block: 0;
      left: calc(var(--at) * var(--minute));
      width: calc(var(--for) * var(--minute));
      border: 1.5px solid var(--ink);
      border-radius: 2px;
    }
    .busy {
      background: var(--ink);
    }
    .shut {
      inset-block: 0.15rem;
      border-width: 1px 0;
      border-color: var(--horizon);
      border-radius: 0;
      background: repeating-linear-gradient(115deg, var(--horizon) 0 1.5px, transparent 1.5px 6px);
    }
    @media print {
      :host {
        -webkit-print-color-adjust: exact;
        print-color-adjust: exact;
      }
    }
    @media (forced-colors: active) {
      .busy {
        forced-color-adjust: none;
        background: CanvasText;
      }
    }
  `,
  host: { class: 'lane', 'aria-hidden': 'true' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RoomLane {
  readonly stretches = input.required<readonly LaneStretch[]>();
}
