import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { SupplyList } from '../../../../shared/contracts/supplies';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { SetOutClient } from '../../../common/api/clinic/set-out-client';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';

type Rule = SupplyList['rules'][number];
type Count = 'perChild' | 'perMorning' | 'childrenPerSpare' | 'underMonths';

/** The clinic's own counts: so many for each child, so many for the morning, one spare for so many children. */
@Component({
  selector: 'td-supply-list',
  imports: [RouterLink, SheetStates],
  templateUrl: './supply-list.html',
  styleUrl: './supply-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SupplyListScreen {
  private readonly client = inject(SetOutClient);

  protected readonly loaded = new Loaded(() => this.client.list());
  protected readonly list = this.loaded.value;
  /** What was changed on this screen and is not kept yet. */
  private readonly changed = signal<readonly Rule[] | null>(null);
  protected readonly isBusy = signal(false);
  protected readonly says = signal<string | null>(null);
  protected readonly failure = signal<string | null>(null);
  /** Every thing that is known, on the list or not; one that is set to nothing is left out of a morning. */
  protected readonly rules = computed<readonly Rule[]>(() => {
    const changed = this.changed();
    if (changed) return changed;
    const own = this.list()?.rules ?? [];
    const others = (this.list()?.startingRules ?? []).filter(
      ({ item }) => !own.some((rule) => rule.item === item),
    );
    return own.length === 0
      ? others
      : [
          ...own,
          ...others.map((rule) => ({
            ...rule,
            perChild: 0,
            perMorning: 0,
            childrenPerSpare: null,
          })),
        ];
  });
  protected readonly isNew = computed(() => this.list()?.rules.length === 0);

  constructor() {
    void this.loaded.again();
  }

  protected count(item: string, count: Count, typed: string): void {
    const canBeNone = count === 'childrenPerSpare' || count === 'underMonths';
    const value = typed === '' && canBeNone ? null : Math.max(0, Math.round(Number(typed) || 0));
    this.changed.set(
      this.rules().map((rule) => (rule.item === item ? { ...rule, [count]: value } : rule)),
    );
  }

  protected async keep(event: Event): Promise<void> {
    event.preventDefault();
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.says.set(null);
    this.failure.set(null);
    const rules = this.rules().map(({ says: _says, ...rule }) => rule);
    try {
      this.loaded.show(await this.client.keepList({ rules }));
      this.changed.set(null);
      this.says.set($localize`:@@clinic.supply-list.kept:The list is kept.`);
    } catch (error) {
      const failure = clinicFailure(error);
      this.failure.set([failure.message, ...failure.fields.values()].join(' '));
    } finally {
      this.isBusy.set(false);
    }
  }
}
