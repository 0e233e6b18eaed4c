import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  numberAttribute,
  untracked,
} from '@angular/core';
import { RouterLink } from '@angular/router';
import { HouseClient } from '../../../common/api/clinic/house-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { deedSays, matterSays } from './matter-words';

/** Who saw and changed what about which child, when and from where. */
@Component({
  selector: 'td-access-record',
  imports: [SheetStates, RouterLink, MomentPipe],
  templateUrl: './access-record.html',
  styleUrl: './access-record.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AccessRecord {
  private readonly client = inject(HouseClient);

  /** Only rows about this child; from the address. */
  readonly child = input<number, unknown>(Number.NaN, { transform: numberAttribute });
  protected readonly zone = inject(ClinicUser).zone;
  protected readonly loaded = new Loaded(() =>
    this.client.accessRecord(Number.isNaN(this.child()) ? {} : { childId: this.child() }),
  );
  protected readonly says = matterSays;
  protected readonly deed = deedSays;
  protected readonly rows = computed(() => this.loaded.value()?.rows ?? []);

  constructor() {
    effect(() => {
      this.child();
      untracked(() => void this.loaded.again());
    });
  }
}
