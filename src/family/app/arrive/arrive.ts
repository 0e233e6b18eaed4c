import {
  ChangeDetectionStrategy,
  Component,
  LOCALE_ID,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { Router, RouterLink } from '@angular/router';
import type { LinkDescription } from '../../../../shared/contracts/family-session';
import { type FamilyFailure, familyFailure } from '../../../common/api/family/family-failure';
import { FamilySessionClient } from '../../../common/api/family/family-session-client';
import { FamilyClock } from '../../../common/session/family-clock';
import { FamilyVisit } from '../../../common/session/family-visit';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { SkyBand } from '../../../common/ui/sky-band/sky-band';
import { PageSkeleton } from '../../../common/ui/states/page-skeleton';
import { PageTrouble } from '../../../common/ui/states/page-trouble';
import { BirthDateForm } from './birth-date-form';
import { ClosedLink } from './closed-link';
import { linkState } from './link-state';

/** What a link in a text or an e-mail opens. Nothing is asked of a phone that is remembered. */
@Component({
  selector: 'td-arrive',
  imports: [BirthDateForm, ClosedLink, PageHeading, PageSkeleton, PageTrouble, RouterLink, SkyBand],
  templateUrl: './arrive.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Arrive {
  private readonly client = inject(FamilySessionClient);
  private readonly visit = inject(FamilyVisit);
  private readonly router = inject(Router);
  private readonly clock = inject(FamilyClock);

  /** From the address. */
  readonly token = input.required<string>();

  protected readonly link = signal<LinkDescription | null>(null);
  protected readonly failure = signal<FamilyFailure | null>(null);
  protected readonly isOpening = signal(false);
  /** The clinic did not know the date; how many more times it may be tried. */
  protected readonly wrongDate = signal<{ triesLeft: number | null } | null>(null);
  protected readonly isMonthFirst = inject(LOCALE_ID).startsWith('en');
  protected readonly today = computed(() =>
    // A child born today anywhere on earth is not born in the future.
    new Date(this.clock.now() + 14 * 3_600_000).toISOString().slice(0, 10),
  );

  constructor() {
    effect(() => {
      const token = this.token();
      untracked(() => void this.describe(token));
    });
  }

  protected async describe(token: string): Promise<void> {
    this.failure.set(null);
    try {
      const link = await this.client.describeLink(token);
      this.visit.meetClinic(link.clinic);
      this.link.set(link);
      if (link.state === 'open' && link.needs === 'nothing') await this.open(null, false);
    } catch (error) {
      this.failure.set(familyFailure(error));
    }
  }

  protected async open(bornOn: string | null, isRemembered: boolean): Promise<void> {
    if (this.isOpening()) return;
    this.isOpening.set(true);
    this.failure.set(null);
    this.wrongDate.set(null);
    try {
      const session = await this.client.openLink({ token: this.token(), bornOn, isRemembered });
      await this.visit.begin(session);
      // The address with the link in it does not stay in the history of the phone.
      await this.router.navigateByUrl(session.opens === 'morning-question' ? '/morning' : '/', {
        replaceUrl: true,
      });
    } catch (error) {
      this.refused(familyFailure(error));
    } finally {
      this.isOpening.set(false);
    }
  }

  private refused(failure: FamilyFailure): void {
    const state = linkState(failure);
    if (state === 'wrong-date') {
      this.wrongDate.set({ triesLeft: failure.number('triesLeft') });
    } else if (state !== null) {
      this.link.update((link) => link && { ...link, state });
    } else {
      this.failure.set(failure);
    }
  }
}
