import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { PictureMark } from './picture-mark';

/** The disc by which a child is found again on every screen: face, place and colour, beside its name. */
@Component({
  selector: 'td-child-face',
  imports: [PictureMark],
  template: `<td-picture [name]="face()" />`,
  host: { '[class]': '"token child-" + place()', 'aria-hidden': 'true' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChildFace {
  readonly face = input.required<'baby' | 'toddler' | 'child'>();
  /** 1 to 4: the child's lane. */
  readonly place = input.required<number>();
}
