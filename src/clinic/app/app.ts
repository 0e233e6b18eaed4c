import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { NavigationEnd, Router, RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { filter, pairwise } from 'rxjs';
import type { Right } from '../../../shared/access/rights';
import { ClinicUser } from '../../common/session/clinic-user';
import { SchemeSwitch } from '../../common/ui/scheme-switch/scheme-switch';
import { AlertsStrip } from './alerts/alerts-strip';
import { LanguageSwitch } from './language-switch';
import { OutboxAlarm } from './messages/outbox-alarm';

interface ScreenWord {
  readonly path: string;
  readonly says: string;
  readonly right: Right;
}

const words: readonly ScreenWord[] = [
  {
    path: '/this-morning',
    says: $localize`:@@clinic.nav.this-morning:This morning`,
    right: 'mornings.read',
  },
  { path: '/calls', says: $localize`:@@clinic.nav.calls:Calls`, right: 'calls.read' },
  { path: '/orders', says: $localize`:@@clinic.nav.orders:Orders`, right: 'orders.write' },
  { path: '/children', says: $localize`:@@clinic.nav.children:Children`, right: 'children.read' },
  {
    path: '/specimens',
    says: $localize`:@@clinic.nav.specimens:Specimens`,
    right: 'specimens.read',
  },
  { path: '/results', says: $localize`:@@clinic.nav.results:Results`, right: 'results.read' },
  { path: '/letters', says: $localize`:@@clinic.nav.letters:Letters`, right: 'letters.read' },
  { path: '/messages', says: $localize`:@@clinic.nav.messages:Messages`, right: 'messages.read' },
  { path: '/wording', says: $localize`:@@clinic.nav.wording:Wording`, right: 'wording.read' },
  { path: '/set-up', says: $localize`:@@clinic.nav.set-up:Set-up`, right: 'set-up.read' },
  {
    path: '/rehearsal',
    says: $localize`:@@clinic.nav.rehearsal:Rehearsal`,
    right: 'rehearsal.use',
  },
];

/** The frame of the clinic's side: one line of words over a horizon, the current one with a sun on it. */
@Component({
  selector: 'td-root',
  imports: [
    AlertsStrip,
    LanguageSwitch,
    OutboxAlarm,
    RouterLink,
    RouterLinkActive,
    RouterOutlet,
    SchemeSwitch,
  ],
  templateUrl: './app.html',
  styleUrl: './app.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class App {
  private readonly router = inject(Router);
  protected readonly name = 'Threedawn';
  protected readonly user = inject(ClinicUser);
  protected readonly isOpen = signal(false);
  protected readonly words = computed(() => {
    const session = this.user.session();
    if (!session) return [];
    return words.filter(
      (word) =>
        session.staff.rights.includes(word.right) &&
        (word.path !== '/rehearsal' || session.hasRehearsal),
    );
  });

  protected readonly hearsOfMessages = computed(
    () => this.user.session()?.staff.rights.includes('messages.read') ?? false,
  );

  protected readonly hearsOfAlerts = computed(
    () => this.user.session()?.staff.rights.includes('alerts.take') ?? false,
  );

  constructor() {
    this.router.events
      .pipe(
        filter((event) => event instanceof NavigationEnd),
        pairwise(),
        takeUntilDestroyed(),
      )
      .subscribe(([before, after]) => {
        this.isOpen.set(false);
        if (path(before.urlAfterRedirects) !== path(after.urlAfterRedirects)) focusHeading();
      });
  }

  protected async signOut(): Promise<void> {
    await this.user.signOut();
    await this.router.navigate(['/sign-in']);
  }

  protected skip(event: Event): void {
    event.preventDefault();
    focusHeading();
  }
}

const path = (url: string): string => url.split(/[?#]/)[0] ?? url;

/** After a change of screen the reader starts at its heading. */
function focusHeading(): void {
  setTimeout(() => document.querySelector<HTMLElement>('h1')?.focus({ preventScroll: false }));
}
