import {
  ChangeDetectionStrategy,
  Component,
  DOCUMENT,
  computed,
  inject,
  signal,
} from '@angular/core';
import { RouterLink } from '@angular/router';
import type { FamilyFailure } from '../../../common/api/family/family-failure';
import { FamilyAnswers } from '../../../common/session/family-answers';
import { FamilyScheme, type Scheme } from '../../../common/session/family-scheme';
import { FamilyVisit } from '../../../common/session/family-visit';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { PageTrouble } from '../../../common/ui/states/page-trouble';

/** The other pages, the look of the page, and the way out. */
@Component({
  selector: 'td-more-links',
  imports: [PageTrouble, PictureMark, RouterLink],
  templateUrl: './more-links.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MoreLinks {
  private readonly visit = inject(FamilyVisit);
  private readonly document = inject(DOCUMENT);
  private readonly answers = inject(FamilyAnswers);
  protected readonly scheme = inject(FamilyScheme);

  protected readonly schemes: { id: Scheme; says: string }[] = [
    { id: 'device', says: $localize`:@@family.more.asPhone:As on this phone` },
    { id: 'light', says: $localize`:@@family.more.light:Light` },
    { id: 'dark', says: $localize`:@@family.more.dark:Dark` },
  ];
  protected readonly maySeeLetters = computed(() => this.visit.session()?.maySeeLetters ?? false);
  protected readonly isRemembered = computed(() => this.visit.session()?.isRemembered ?? false);
  protected readonly hasUnsent = computed(() => this.answers.waiting().length > 0);
  protected readonly asks = signal<'sign-out' | 'forget' | null>(null);
  protected readonly isLeaving = signal(false);
  protected readonly failure = signal<FamilyFailure | null>(null);

  protected print(): void {
    this.document.defaultView?.print();
  }

  protected async leave(way: 'sign-out' | 'forget'): Promise<void> {
    if (this.isLeaving()) return;
    this.isLeaving.set(true);
    this.failure.set(null);
    try {
      await this.visit.leave(way);
      // A new page, so that nothing of the family stays in memory either.
      this.document.location.assign(new URL('code', this.document.baseURI));
    } catch (failure) {
      this.failure.set(failure as FamilyFailure);
      this.isLeaving.set(false);
    }
  }
}
