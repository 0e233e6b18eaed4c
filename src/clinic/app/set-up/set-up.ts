import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { HouseClient } from '../../../common/api/clinic/house-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { DayPipe, MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';

const weekdays = [
  $localize`:@@clinic.weekday.1:Monday`,
  $localize`:@@clinic.weekday.2:Tuesday`,
  $localize`:@@clinic.weekday.3:Wednesday`,
  $localize`:@@clinic.weekday.4:Thursday`,
  $localize`:@@clinic.weekday.5:Friday`,
  $localize`:@@clinic.weekday.6:Saturday`,
  $localize`:@@clinic.weekday.7:Sunday`,
];

/** Site, rooms, hours, fasting protocols and laboratory profiles, each with who signed it. */
@Component({
  selector: 'td-set-up',
  imports: [RouterLink, SheetStates, DayPipe, MomentPipe],
  templateUrl: './set-up.html',
  styleUrl: './set-up.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SetUpScreen {
  private readonly client = inject(HouseClient);
  private readonly user = inject(ClinicUser);

  protected readonly zone = this.user.zone;
  protected readonly loaded = new Loaded(() => this.client.setUp());
  protected readonly setUp = this.loaded.value;
  protected readonly maySeePeople = computed(() => this.user.has('people.read'));
  protected readonly maySeeAccess = computed(() => this.user.has('access-record.read'));
  protected readonly days = computed(() =>
    (this.setUp()?.site.clinicWeekdays ?? []).map((day) => weekdays[day - 1] ?? '').join(', '),
  );

  constructor() {
    void this.loaded.again();
  }
}
