import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { Router } from '@angular/router';
import { HouseClient } from '../../../common/api/clinic/house-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';

/** Every text that leaves the clinic, by version: who wrote it, who signed it off. */
@Component({
  selector: 'td-wording',
  imports: [SheetStates, MomentPipe],
  templateUrl: './wording.html',
  styleUrl: './wording.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WordingScreen {
  private readonly client = inject(HouseClient);
  private readonly router = inject(Router);

  /** Words to look for, from the address. */
  readonly find = input<string>();
  protected readonly zone = inject(ClinicUser).zone;
  protected readonly loaded = new Loaded(() => this.client.wordings());
  protected readonly wordings = computed(() => {
    const all = this.loaded.value()?.wordings ?? [];
    const words = (this.find() ?? '').trim().toLowerCase();
    if (words === '') return all;
    return all.filter((one) => `${one.messageKey} ${one.body}`.toLowerCase().includes(words));
  });
  protected readonly unsigned = computed(
    () => (this.loaded.value()?.wordings ?? []).filter((one) => !one.isSignedOff).length,
  );

  constructor() {
    void this.loaded.again();
  }

  protected look(event: Event, words: string): void {
    event.preventDefault();
    void this.router.navigate([], { queryParams: { find: words === '' ? null : words } });
  }
}
