import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  numberAttribute,
  signal,
  untracked,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import { filter } from 'rxjs';
import type { LetterChoices, LetterSigned } from '../../../../shared/contracts/letters';
import { type ClinicFailure, clinicFailure } from '../../../common/api/clinic/clinic-http';
import { LettersClient } from '../../../common/api/clinic/letters-client';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { DayPipe, MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { LetterSettle } from './letter-settle';

/** One letter: the results, the letter they allow, both languages side by side, and what is still missing. */
@Component({
  selector: 'td-letter-desk',
  imports: [SheetStates, LetterSettle, RouterLink, DayPipe, MomentPipe],
  templateUrl: './letter-desk.html',
  styleUrl: './letter-desk.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LetterDeskScreen {
  private readonly client = inject(LettersClient);
  private readonly user = inject(ClinicUser);

  readonly seriesId = input.required({ transform: numberAttribute });
  protected readonly choices = signal<LetterChoices>({});
  protected readonly loaded = new Loaded(() => this.client.desk(this.seriesId(), this.choices()));
  protected readonly desk = this.loaded.value;
  protected readonly zone = this.user.zone;
  protected readonly maySign = computed(() => this.user.has('letters.sign'));
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<ClinicFailure | null>(null);
  protected readonly signed = signal<LetterSigned | null>(null);
  protected readonly family = computed(() => this.desk()?.recipients[0] ?? null);
  protected readonly resultIds = computed(() =>
    (this.desk()?.specimens ?? []).flatMap((one) => (one.results ?? []).map((result) => result.id)),
  );

  constructor() {
    effect(() => {
      this.seriesId();
      this.choices();
      untracked(() => void this.loaded.again());
    });
    inject(LiveClient)
      .news.pipe(
        filter((news) => ['results', 'calls', 'opened'].includes(news.topic)),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }

  protected resultOf(specimen: number, test: string): string {
    const found = this.desk()
      ?.specimens.find((one) => one.id === specimen)
      ?.results?.find((result) => result.test === test);
    return (
      found?.says.replace(/^[^:]+: /, '') ?? $localize`:@@clinic.letter-desk.not-done:not done`
    );
  }

  protected isFinal(specimen: number): boolean {
    const results = this.desk()?.specimens.find((one) => one.id === specimen)?.results ?? [];
    return results.some((result) => result.test === 'culture' && result.finality === 'final');
  }

  protected isLeftOut(key: string): boolean {
    return this.choices().leftOut?.includes(key) ?? false;
  }

  protected turnOut(key: string): void {
    const leftOut = this.choices().leftOut ?? [];
    this.choices.update((choices) => ({
      ...choices,
      leftOut: leftOut.includes(key) ? leftOut.filter((one) => one !== key) : [...leftOut, key],
    }));
  }

  protected choose(change: LetterChoices): void {
    this.choices.update((choices) => ({ ...choices, ...change }));
  }

  protected pdf(letterId: number): string {
    return this.client.pdfAddress(letterId);
  }

  protected async sign(request: { password: string; release: boolean }): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      this.signed.set(
        await this.client.sign(this.seriesId(), {
          ...request,
          choices: this.choices(),
          resultsSeen: this.resultIds(),
        }),
      );
    } catch (error) {
      this.failure.set(clinicFailure(error));
    } finally {
      this.isBusy.set(false);
      await this.loaded.again();
    }
  }
}
