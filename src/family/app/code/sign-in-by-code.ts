import { ChangeDetectionStrategy, Component, DOCUMENT, inject, signal } from '@angular/core';
import { Router } from '@angular/router';
import { type FamilyFailure, familyFailure } from '../../../common/api/family/family-failure';
import { FamilySessionClient } from '../../../common/api/family/family-session-client';
import { FamilyVisit } from '../../../common/session/family-visit';
import { CodeEntry } from '../../../common/ui/code-entry/code-entry';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { SkyBand } from '../../../common/ui/sky-band/sky-band';
import { PageTrouble } from '../../../common/ui/states/page-trouble';

/** Sign in with a telephone number or e-mail address and a code. The answer never tells whether we know it. */
@Component({
  selector: 'td-sign-in-by-code',
  imports: [CodeEntry, PageHeading, PageTrouble, PictureMark, SkyBand],
  templateUrl: './sign-in-by-code.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignInByCode {
  private readonly client = inject(FamilySessionClient);
  private readonly visit = inject(FamilyVisit);
  private readonly router = inject(Router);
  private readonly document = inject(DOCUMENT);

  protected readonly address = signal('');
  protected readonly isWrongAddress = signal(false);
  protected readonly isSent = signal(false);
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<FamilyFailure | null>(null);
  protected readonly refusal = signal<FamilyFailure | null>(null);

  protected async send(event?: Event): Promise<void> {
    event?.preventDefault();
    const address = this.address().trim();
    this.isWrongAddress.set(address.length < 5);
    if (address.length < 5) {
      this.document.getElementById('address')?.focus();
      return;
    }
    const sent = await this.attempt(() =>
      this.client.sendCode({ channel: address.includes('@') ? 'mail' : 'sms', address }),
    );
    if (sent) this.isSent.set(true);
  }

  protected async check(entered: { code: string; isRemembered: boolean }): Promise<void> {
    await this.attempt(async () => {
      const session = await this.client.checkCode({ ...entered, address: this.address().trim() });
      await this.visit.begin(session);
      await this.router.navigateByUrl(session.opens === 'morning-question' ? '/morning' : '/', {
        replaceUrl: true,
      });
    });
  }

  protected startAgain(): void {
    this.isSent.set(false);
    this.refusal.set(null);
  }

  private async attempt(work: () => Promise<unknown>): Promise<boolean> {
    if (this.isBusy()) return false;
    this.isBusy.set(true);
    this.failure.set(null);
    this.refusal.set(null);
    try {
      await work();
      return true;
    } catch (error) {
      const failure = familyFailure(error);
      if (failure.kind === 'refused' || failure.kind === 'signed-out') this.refusal.set(failure);
      else this.failure.set(failure);
      return false;
    } finally {
      this.isBusy.set(false);
    }
  }
}
