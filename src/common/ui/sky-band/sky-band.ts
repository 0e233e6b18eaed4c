import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Sky } from './sky-of';

/** The head of a page: a sky by the clinic's clock. Tall where suns rise under it, slim elsewhere. */
@Component({
  selector: 'td-sky-band',
  template: `<div class="sky-top band">
      <span>{{ clinicName() }}</span><ng-content select="[top]" />
    </div>
    <div class="sky-words band"><ng-content /></div>`,
  host: { class: 'sky', '[class.sky-tall]': 'isTall()', '[attr.data-sky]': 'shown()' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SkyBand {
  readonly sky = input<Sky | null>(null);
  readonly clinicName = input('');
  readonly isTall = input(false);
  protected readonly shown = computed(() => this.sky() ?? 'evening');
}
