import { ChangeDetectionStrategy, Component, LOCALE_ID, inject } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NavigationEnd, Router } from '@angular/router';
import { filter, map } from 'rxjs';
import { clinicLanguages } from '../../../shared/languages/clinic-languages';
import { languageOf } from '../../../shared/languages/languages';

/** The same screen in the other languages: each language is a build of its own, so that the page loads anew. */
@Component({
  selector: 'td-language-switch',
  template: `<nav aria-label="Language" i18n-aria-label="@@clinic.nav.languages">
    @for (other of others; track other.id) {
      <a
        [href]="'/clinic/' + other.id + url()"
        [attr.lang]="other.tag"
        [attr.hreflang]="other.tag"
        >{{ other.nativeName }}</a
      >
    }
  </nav>`,
  styles: `
    nav {
      display: flex;
      gap: var(--space-2);
    }
    a {
      display: inline-flex;
      align-items: center;
      min-height: var(--control, var(--target));
      padding-inline: 0.45rem;
      color: inherit;
    }
    :host(.at-door) nav {
      justify-content: flex-end;
      padding-inline: var(--edge);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LanguageSwitch {
  private readonly router = inject(Router);
  private readonly own = inject(LOCALE_ID).split('-')[0];
  protected readonly others = clinicLanguages.filter((id) => id !== this.own).map(languageOf);
  protected readonly url = toSignal(
    this.router.events.pipe(
      filter((event) => event instanceof NavigationEnd),
      map(() => this.router.url),
    ),
    { initialValue: this.router.url },
  );
}
