import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { Router } from '@angular/router';
import { filter } from 'rxjs';
import type { Specimen, SpecimenStepRequest } from '../../../../shared/contracts/specimens';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { SpecimensClient } from '../../../common/api/clinic/specimens-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { SpecimenRow } from './specimen-row';

/** Specimens on their way, the one in the greatest hurry first; a filter that keeps its place in the address. */
@Component({
  selector: 'td-specimens',
  imports: [SheetStates, SpecimenRow],
  templateUrl: './specimens.html',
  styleUrl: './specimens.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Specimens {
  private readonly client = inject(SpecimensClient);
  private readonly router = inject(Router);
  private readonly user = inject(ClinicUser);

  /** 'way' (not received yet), 'laboratory' or 'all'; from the address. */
  readonly show = input<string>();
  protected readonly zone = this.user.zone;
  protected readonly loaded = new Loaded(() => this.client.list());
  protected readonly busyId = signal<number | null>(null);
  protected readonly says = signal<{
    readonly id: number;
    readonly lines: readonly string[];
  } | null>(null);
  protected readonly mayWrite = computed(() => this.user.has('specimens.write'));
  protected readonly chosen = computed(() => this.show() ?? 'all');
  protected readonly rows = computed(() => {
    const all = this.loaded.value()?.specimens ?? [];
    const shown = all.filter((one) => {
      if (this.chosen() === 'way') return one.receivedAt === null && one.rejectedAt === null;
      if (this.chosen() === 'laboratory') return one.receivedAt !== null;
      return true;
    });
    return [...shown].sort((a, b) => urgency(a).localeCompare(urgency(b)));
  });

  constructor() {
    void this.loaded.again();
    inject(LiveClient)
      .news.pipe(
        filter((news) => ['specimens', 'results', 'opened'].includes(news.topic)),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }

  protected choose(show: string): void {
    void this.router.navigate([], { queryParams: { show: show === 'all' ? null : show } });
  }

  protected async step(specimen: Specimen, request: SpecimenStepRequest): Promise<void> {
    if (this.busyId() !== null) return;
    this.busyId.set(specimen.id);
    try {
      const changed = await this.client.step(specimen.id, request);
      this.says.set({ id: specimen.id, lines: changed.warnings });
    } catch (error) {
      const failure = clinicFailure(error);
      this.says.set({ id: specimen.id, lines: [failure.message, ...failure.fields.values()] });
    } finally {
      this.busyId.set(null);
      await this.loaded.again();
    }
  }
}

/** On the way before at the laboratory; overdue before waiting; then by time. */
function urgency(one: Specimen): string {
  if (one.receivedAt === null && one.rejectedAt === null) return `0 ${one.receiptBy}`;
  return one.isOverdue ? `1 ${one.finalExpectedOn ?? ''}` : `2 ${one.finalExpectedOn ?? ''}`;
}
