import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { markShapes, type MarkName } from './mark-shapes';

/** A state's own shape; the word stands beside it, the colour comes from the text around. */
@Component({
  selector: 'td-state-mark',
  template: `<svg viewBox="0 0 20 20" focusable="false">
    @for (part of parts(); track $index) {
      <path
        [attr.d]="part.d"
        [attr.fill]="part.width === 0 ? 'currentColor' : 'none'"
        [attr.stroke]="part.width === 0 ? null : 'currentColor'"
        [attr.stroke-width]="part.width || null"
        fill-rule="evenodd"
        stroke-linecap="round"
        stroke-linejoin="round"
      />
    }
  </svg>`,
  styles: `
    :host {
      display: inline-block;
      flex: none;
      width: 1.15em;
      height: 1.15em;
      vertical-align: -0.2em;
    }
    svg {
      display: block;
      width: 100%;
      height: 100%;
    }
  `,
  host: { class: 'mark', 'aria-hidden': 'true' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StateMark {
  readonly name = input.required<MarkName>();
  protected readonly parts = computed(() => markShapes[this.name()]);
}
