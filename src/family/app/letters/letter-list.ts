import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  signal,
  untracked,
} from '@angular/core';
import { Router, RouterLink } from '@angular/router';
import type { FamilyLetterList } from '../../../../shared/contracts/family-letters';
import { type FamilyFailure, familyFailure } from '../../../common/api/family/family-failure';
import { FamilyLettersClient } from '../../../common/api/family/family-letters-client';
import { FamilyVisit } from '../../../common/session/family-visit';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { SkyBand } from '../../../common/ui/sky-band/sky-band';
import { PageSkeleton } from '../../../common/ui/states/page-skeleton';
import { PageTrouble } from '../../../common/ui/states/page-trouble';
import { FreshCode } from './fresh-code';

/** The letters of the family, behind a fresh code; nothing of them stays on the phone. */
@Component({
  selector: 'td-letter-list',
  imports: [FreshCode, PageHeading, PageSkeleton, PageTrouble, PictureMark, RouterLink, SkyBand],
  templateUrl: './letter-list.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LetterList {
  private readonly client = inject(FamilyLettersClient);
  private readonly visit = inject(FamilyVisit);
  private readonly router = inject(Router);

  protected readonly clinic = this.visit.clinic;
  protected readonly session = this.visit.session;
  protected readonly isFresh = computed(() => this.visit.session()?.reach === 'fresh');
  protected readonly list = signal<FamilyLetterList | null>(null);
  protected readonly failure = signal<FamilyFailure | null>(null);

  constructor() {
    effect(() => {
      if (this.isFresh()) untracked(() => void this.load());
    });
  }

  protected async load(): Promise<void> {
    this.failure.set(null);
    try {
      this.list.set(await this.client.letters());
    } catch (error) {
      const failure = familyFailure(error);
      // The minutes after the code are over: ask for a new one instead of showing a fault.
      if (
        failure.kind === 'refused' &&
        (await this.visit.load().catch(() => null)) &&
        !this.isFresh()
      ) {
        this.list.set(null);
        return;
      }
      this.failure.set(failure);
    }
  }

  protected async close(): Promise<void> {
    this.list.set(null);
    await this.visit.closeLetters().catch(() => null);
    await this.router.navigateByUrl('/', { replaceUrl: true });
  }
}
