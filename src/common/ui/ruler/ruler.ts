import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { RulerScale } from './ruler-scale';

/**
 * The hours over the bars. Its place in the sheet's columns, `--minute` (the width of one minute) and `--now` come
 * from the sheet. Drawn only: the words beside each bar say it all.
 */
@Component({
  selector: 'td-ruler',
  template: `
    @for (hour of scale().hours; track hour.minute) {
      @if (!isNear(hour.minute)) {
        <i [style.--at]="hour.minute">{{ hour.says }}</i>
      }
    }
    @if (now() !== null) {
      <i class="is-now">{{ nowSays() }}</i>
    }
  `,
  styles: `
    :host {
      position: relative;
      display: block;
      align-self: stretch;
    }
    i {
      position: absolute;
      top: 50%;
      left: calc(var(--at, var(--now)) * var(--minute));
      transform: translate(-50%, -50%);
    }
    .is-now {
      padding: 0 0.35em;
      border-radius: 4px;
      background: var(--rose);
      color: var(--on-rose);
      font-weight: 800;
    }
  `,
  host: { 'aria-hidden': 'true' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Ruler {
  readonly scale = input.required<RulerScale>();
  /** Minutes on the ruler; null on another day. */
  readonly now = input.required<number | null>();
  readonly nowSays = input('');

  /** The flag of now takes the room of the hours next to it. */
  protected isNear(minute: number): boolean {
    const now = this.now();
    return now !== null && Math.abs(now - minute) < 50;
  }
}
