import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterLink } from '@angular/router';

@Component({
  selector: 'td-not-found',
  imports: [RouterLink],
  template: `
    <svg class="dawn" viewBox="0 0 240 100" aria-hidden="true">
      <circle class="sun-done" cx="40" cy="62" r="14" />
      <circle class="sun-later" cx="100" cy="76" r="20" />
      <path class="sun-next" d="M146 76a34 34 0 0 1 68 0Z" />
      <path class="horizon" d="M0 76h240" />
    </svg>
    <div class="lead">
      <h1 tabindex="-1" i18n="@@clinic.not-found.heading">There is nothing here</h1>
      <p class="count" i18n="@@clinic.not-found.says">
        The address is wrong, or your role does not open this screen.
      </p>
    </div>
    <a class="do first" routerLink="/" i18n="@@clinic.not-found.back">Go to your first screen</a>
  `,
  styles: `
    :host {
      display: block;
      width: min(30rem, 100%);
      margin: max(var(--space-5), 8vh) auto 0;
    }
    .dawn {
      width: 100%;
      max-width: 24rem;
      height: auto;
    }
    .do {
      min-height: var(--target);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotFound {}
