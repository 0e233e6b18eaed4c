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
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import { closeDaysRequest, type SetUp } from '../../../../shared/contracts/set-up';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { SetUpClient } from '../../../common/api/clinic/set-up-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { DayPipe } from '../../../common/ui/clinic-times';
import { faultOf, issuesByPath, showFaults } from '../../../common/ui/form/form-faults';
import { formFieldLook } from '../../../common/ui/form/form-field-look';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';

type Closure = SetUp['closures'][number];
type Holiday = SetUp['holidays'][number];

/** The days on which nobody comes: closures of the clinic's own, and public holidays. */
@Component({
  selector: 'td-calendar',
  imports: [
    DayPipe,
    MatFormFieldModule,
    MatInputModule,
    ReactiveFormsModule,
    RouterLink,
    SheetStates,
  ],
  templateUrl: './calendar.html',
  styleUrls: ['../../../common/ui/form/fields.scss', './part.scss', './calendar.scss'],
  providers: [formFieldLook],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SiteCalendar {
  private readonly client = inject(SetUpClient);
  private readonly user = inject(ClinicUser);

  /** From the address; the own site when there is none. */
  readonly site = input<string>();

  private readonly siteId = computed(() => Number(this.site()) || null);
  protected readonly loaded = new Loaded(() => this.client.read(this.siteId()));
  protected readonly setUp = this.loaded.value;
  protected readonly mayWrite = computed(() => this.user.has('set-up.write'));
  protected readonly mayClose = computed(() => this.user.has('mornings.close'));
  protected readonly faultOf = faultOf;
  protected readonly isBusy = signal(false);
  protected readonly says = signal<readonly string[]>([]);
  protected readonly done = signal<string | null>(null);
  protected readonly form = inject(NonNullableFormBuilder).group({
    from: '',
    until: '',
    reason: '',
  });

  constructor() {
    effect(() => {
      this.siteId();
      untracked(() => void this.loaded.again());
    });
  }

  protected async closeDays(): Promise<void> {
    const siteId = this.setUp()?.site.id;
    const { from, until, reason } = this.form.getRawValue();
    const parsed = closeDaysRequest.safeParse({
      siteId,
      from,
      // One day needs to be given once.
      until: until === '' ? from : until,
      reason,
    });
    if (!parsed.success) {
      this.says.set(showFaults(this.form, issuesByPath(parsed.error.issues)));
      return;
    }
    const kept = await this.act(() => this.client.closeDays(parsed.data));
    if (!kept) return;
    this.form.reset();
    this.done.set($localize`:@@clinic.calendar.closed:The days are closed for planning.`);
  }

  protected async open({ from, until }: Closure): Promise<void> {
    const siteId = this.setUp()?.site.id;
    if (siteId === undefined) return;
    if (await this.act(() => this.client.openDays({ siteId, from, until })))
      this.done.set($localize`:@@clinic.calendar.opened:The days are open again.`);
  }

  protected async turn({ on, isOpen }: Holiday): Promise<void> {
    const siteId = this.setUp()?.site.id;
    if (siteId === undefined) return;
    await this.act(() => this.client.setHoliday({ siteId, on, isOpen: !isOpen }));
  }

  private async act(work: () => Promise<SetUp>): Promise<boolean> {
    if (this.isBusy()) return false;
    this.isBusy.set(true);
    this.says.set([]);
    this.done.set(null);
    try {
      this.loaded.show(await work());
      return true;
    } catch (error) {
      const failure = clinicFailure(error);
      const rest = showFaults(this.form, failure.fields);
      this.says.set(failure.fields.size > 0 ? rest : [failure.message]);
      return false;
    } finally {
      this.isBusy.set(false);
    }
  }
}
