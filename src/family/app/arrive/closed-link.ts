import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { PictureMark } from '../../../common/ui/picture/picture-mark';

/** A link that does not open any more, and what to do instead. */
@Component({
  selector: 'td-closed-link',
  imports: [PictureMark, RouterLink],
  template: `<div class="form closed">
    <td-picture class="picture-l" [name]="picture()" />
    @switch (state()) {
      @case ('locked') {
        <p i18n="@@family.arrive.lockedNext">
          The birth date was wrong 5 times. That can happen. Call us, then we open it again.
        </p>
      }
      @case ('used') {
        <p i18n="@@family.arrive.usedNext">
          Did you open it on another phone? On this phone, get a code.
        </p>
        <a class="button button-full" routerLink="/code" i18n="@@family.home.getCode">Get a code</a>
      }
      @case ('expired') {
        <p i18n="@@family.arrive.expiredNext">
          Use the newest text from us, or get a code. You can also call us.
        </p>
        <a class="button button-full" routerLink="/code" i18n="@@family.home.getCode">Get a code</a>
      }
      @default {
        <p i18n="@@family.arrive.unknownNext">
          Was a part of it lost? Open the text again and tap the whole link. You can also get a
          code, or call us.
        </p>
        <a class="button button-full" routerLink="/code" i18n="@@family.home.getCode">Get a code</a>
      }
    }
  </div>`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ClosedLink {
  readonly state = input.required<'expired' | 'used' | 'locked' | 'unknown' | 'open'>();
  protected readonly picture = computed(() => pictures[this.state()]);
}

const pictures = {
  locked: 'lock',
  used: 'saved',
  expired: 'late',
  unknown: 'unsure',
  open: 'unsure',
} as const;
