import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { type FamilyFailure, familyFailure } from '../../../common/api/family/family-failure';
import { FamilySessionClient } from '../../../common/api/family/family-session-client';
import { FamilyVisit } from '../../../common/session/family-visit';
import { CodeEntry } from '../../../common/ui/code-entry/code-entry';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { PageTrouble } from '../../../common/ui/states/page-trouble';

type Way = { channel: 'sms' | 'mail'; says: string };

/** Letters need a new code, also on a remembered phone: other people may hold it. */
@Component({
  selector: 'td-fresh-code',
  imports: [CodeEntry, PageTrouble, PictureMark],
  templateUrl: './fresh-code.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FreshCode {
  private readonly client = inject(FamilySessionClient);
  private readonly visit = inject(FamilyVisit);

  protected readonly ways = computed(() => this.visit.session()?.codeGoesTo ?? []);
  protected readonly way = signal<Way | null>(null);
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<FamilyFailure | null>(null);
  protected readonly refusal = signal<FamilyFailure | null>(null);

  protected async send(way: Way): Promise<void> {
    await this.attempt(async () => {
      await this.client.sendCode({ channel: way.channel });
      this.way.set(way);
    });
  }

  protected async check(code: string): Promise<void> {
    await this.attempt(async () => {
      await this.visit.begin(await this.client.checkCode({ code }));
    });
  }

  private async attempt(work: () => Promise<void>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.failure.set(null);
    this.refusal.set(null);
    try {
      await work();
    } catch (error) {
      const failure = familyFailure(error);
      if (failure.kind === 'refused' || failure.kind === 'signed-out') this.refusal.set(failure);
      else this.failure.set(failure);
    } finally {
      this.isBusy.set(false);
    }
  }
}
