import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import { filter } from 'rxjs';
import type { EnterResultRequest } from '../../../../shared/contracts/specimens';
import { type ClinicFailure, clinicFailure } from '../../../common/api/clinic/clinic-http';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { SpecimensClient } from '../../../common/api/clinic/specimens-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { DayPipe, MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import type { MarkName } from '../../../common/ui/state-mark/mark-shapes';
import { StateMark } from '../../../common/ui/state-mark/state-mark';
import { EnterResult } from './enter-result';

/** Series with results or waiting for them, the most dangerous first. */
@Component({
  selector: 'td-results',
  imports: [SheetStates, StateMark, EnterResult, RouterLink, DayPipe, MomentPipe],
  templateUrl: './results.html',
  styleUrl: './results.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Results {
  private readonly client = inject(SpecimensClient);
  private readonly user = inject(ClinicUser);

  protected readonly zone = this.user.zone;
  protected readonly loaded = new Loaded(() => this.client.results());
  protected readonly series = computed(() => this.loaded.value()?.series ?? []);
  /** The specimen whose entry form is open. */
  protected readonly entering = signal<number | null>(null);
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<ClinicFailure | null>(null);
  protected readonly mayWrite = computed(() => this.user.has('results.write'));
  protected readonly mayLook = computed(() => this.user.has('results.second-look'));
  protected readonly mayWriteLetters = computed(() => this.user.has('letters.read'));
  protected readonly staffName = computed(() => this.user.session()?.staff.fullName ?? '');

  constructor() {
    void this.loaded.again();
    inject(LiveClient)
      .news.pipe(
        filter((news) => ['specimens', 'results', 'opened'].includes(news.topic)),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }

  /** Neither positive nor negative has a shape of its own, so that it is not taken for either. */
  protected markOf({ value, isCritical }: { value: string; isCritical: boolean }): MarkName {
    if (isCritical) return 'ceiling';
    if (value === 'invalid' || value === 'contaminated' || value === 'not-tuberculous')
      return 'unsure';
    return value === 'no-growth-yet' ? 'wait' : 'none';
  }

  protected open(specimenId: number | null): void {
    this.failure.set(null);
    this.entering.set(specimenId);
  }

  protected enter(specimenId: number, request: EnterResultRequest): Promise<void> {
    return this.act(async () => {
      await this.client.enterResult(specimenId, request);
      this.entering.set(null);
    });
  }

  protected look(resultId: number): Promise<void> {
    return this.act(() => this.client.lookAgain(resultId));
  }

  private async act(work: () => Promise<unknown>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      await work();
    } catch (error) {
      this.failure.set(clinicFailure(error));
    } finally {
      this.isBusy.set(false);
      await this.loaded.again();
    }
  }
}
