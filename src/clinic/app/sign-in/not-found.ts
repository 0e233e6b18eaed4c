import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterLink } from '@angular/router';

@Component({
  selector: 'td-not-found',
  imports: [RouterLink],
  template: `
    <div class="lead">
      <h1 tabindex="-1" i18n="@@clinic.not-found.heading">There is nothing here</h1>
      <p class="count" i18n="@@clinic.not-found.says">
        The address is wrong, or your role does not open this screen.
      </p>
    </div>
    <a class="do first" routerLink="/" i18n="@@clinic.not-found.back">Go to your first screen</a>
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotFound {}
