import {
  ChangeDetectionStrategy,
  Component,
  DOCUMENT,
  effect,
  inject,
  input,
  numberAttribute,
  signal,
  untracked,
} from '@angular/core';
import { Router, RouterLink } from '@angular/router';
import type { FamilyLetter } from '../../../../shared/contracts/family-letters';
import { type FamilyFailure, familyFailure } from '../../../common/api/family/family-failure';
import { FamilyLettersClient } from '../../../common/api/family/family-letters-client';
import { FamilyVisit } from '../../../common/session/family-visit';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { PageSkeleton } from '../../../common/ui/states/page-skeleton';
import { PageTrouble } from '../../../common/ui/states/page-trouble';

/** One letter, to read and to print. */
@Component({
  selector: 'td-letter-page',
  imports: [PageHeading, PageSkeleton, PageTrouble, PictureMark, RouterLink],
  templateUrl: './letter-page.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LetterPage {
  private readonly client = inject(FamilyLettersClient);
  private readonly visit = inject(FamilyVisit);
  private readonly router = inject(Router);
  private readonly document = inject(DOCUMENT);

  /** From the address. */
  readonly letterId = input.required({ transform: numberAttribute });
  protected readonly letter = signal<FamilyLetter | null>(null);
  protected readonly failure = signal<FamilyFailure | null>(null);

  constructor() {
    effect(() => {
      const id = this.letterId();
      untracked(() => void this.load(id));
    });
  }

  protected async load(id: number): Promise<void> {
    this.failure.set(null);
    try {
      this.letter.set(await this.client.letter(id));
    } catch (error) {
      const failure = familyFailure(error);
      if (failure.kind === 'signed-out' || failure.problem?.status === 403) {
        await this.visit.load().catch(() => null);
        await this.router.navigateByUrl('/letters', { replaceUrl: true });
        return;
      }
      this.failure.set(failure);
    }
  }

  protected print(): void {
    this.document.defaultView?.print();
  }

  protected async close(): Promise<void> {
    this.letter.set(null);
    await this.visit.closeLetters().catch(() => null);
    await this.router.navigateByUrl('/', { replaceUrl: true });
  }
}
