import { ChangeDetectionStrategy, Component } from '@angular/core';

/** The shape of what is coming, while it comes. */
@Component({
  selector: 'td-page-skeleton',
  template: `<p class="away" role="status" i18n="@@family.state.loading">One moment.</p>
    <div class="skeleton" aria-hidden="true"><i></i><i></i><i></i><i></i></div>`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PageSkeleton {}
