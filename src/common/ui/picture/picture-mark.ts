import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { familyPicture, turnsRound } from '../../pictures/family-pictures';

/** A pictogram. Always beside words that say the same, so hidden from assistive technology. */
@Component({
  selector: 'td-picture',
  template: `@if (strokes(); as strokes) {
    <svg viewBox="0 0 48 48" aria-hidden="true" focusable="false">
      @for (stroke of strokes; track $index) {
        <path [attr.class]="stroke[0]" [attr.d]="stroke[1]" />
      }
    </svg>
  }`,
  host: { class: 'picture', '[class.turns]': 'turns()', '[hidden]': '!strokes()' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PictureMark {
  readonly name = input.required<string>();
  protected readonly strokes = computed(() => familyPicture(this.name()));
  protected readonly turns = computed(() => turnsRound(this.name()));
}
