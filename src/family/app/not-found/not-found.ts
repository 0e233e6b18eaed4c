import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterLink } from '@angular/router';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { SkyBand } from '../../../common/ui/sky-band/sky-band';

@Component({
  selector: 'td-not-found',
  imports: [PageHeading, PictureMark, RouterLink, SkyBand],
  template: `<td-sky-band [sky]="'night'">
      <h1 tdPageHeading="not-found" i18n="@@family.notFound.heading">There is no page here.</h1>
    </td-sky-band>
    <div class="form closed">
      <td-picture class="picture-l" name="unsure" />
      <p i18n="@@family.notFound.next">Perhaps a part of the address was lost.</p>
      <a class="button button-full" routerLink="/" i18n="@@family.question.toPlan">See your plan</a>
    </div>`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotFound {}
