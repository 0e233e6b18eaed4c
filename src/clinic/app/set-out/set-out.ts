import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { RouterLink } from '@angular/router';
import type { SetOut } from '../../../../shared/contracts/supplies';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { SetOutClient } from '../../../common/api/clinic/set-out-client';
import { longDay } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';

type Line = SetOut['lines'][number];

/** What lies ready for a morning: counted with spares, looked at by one person, what is missing is named. */
@Component({
  selector: 'td-set-out',
  imports: [RouterLink, SheetStates],
  templateUrl: './set-out.html',
  styleUrl: './set-out.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SetOutScreen {
  private readonly client = inject(SetOutClient);

  /** The day of the morning; tomorrow without one. */
  readonly on = input<string>();

  protected readonly loaded = new Loaded(() => this.client.read(this.on()));
  protected readonly morning = this.loaded.value;
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<string | null>(null);
  /** The line whose lack is being written down. */
  protected readonly lacking = signal<string | null>(null);
  protected readonly longDay = longDay;
  protected readonly open = computed(
    () => this.morning()?.lines.filter(({ isReady }) => isReady === null).length ?? 0,
  );

  constructor() {
    effect(() => {
      this.on();
      untracked(() => void this.loaded.again());
    });
  }

  protected lack(event: Event, { item }: Line, note: string): void {
    event.preventDefault();
    void this.tick([item], false, note);
  }

  protected async tick(items: Line['item'][], isReady: boolean, note: string): Promise<void> {
    const on = this.morning()?.on;
    if (this.isBusy() || on === undefined) return;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      this.loaded.show(await this.client.tick(on, { items, isReady, note }));
      this.lacking.set(null);
    } catch (error) {
      this.failure.set(clinicFailure(error).message);
    } finally {
      this.isBusy.set(false);
    }
  }
}
