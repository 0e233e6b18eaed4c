import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { addStaffRequest } from '../../../../shared/contracts/clinic-session';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { ClinicSessionClient } from '../../../common/api/clinic/clinic-session-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { StateMark } from '../../../common/ui/state-mark/state-mark';
import { roleSays, roleWords } from './role-words';
import { schemaSentence } from '../../../common/ui/form/schema-sentences';

/** Staff accounts and their roles. */
@Component({
  selector: 'td-people',
  imports: [ReactiveFormsModule, SheetStates, StateMark],
  templateUrl: './people.html',
  styleUrl: './people.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class People {
  private readonly client = inject(ClinicSessionClient);
  private readonly user = inject(ClinicUser);

  protected readonly loaded = new Loaded(() => this.client.people());
  protected readonly staff = computed(() => this.loaded.value()?.staff ?? []);
  protected readonly mayWrite = computed(() => this.user.has('people.write'));
  protected readonly roles = roleWords;
  protected readonly chosen = signal<readonly string[]>([]);
  protected readonly faults = signal<ReadonlyMap<string, string>>(new Map());
  protected readonly invitation = signal<string | null>(null);
  protected readonly isBusy = signal(false);
  protected readonly form = inject(NonNullableFormBuilder).group({
    fullName: '',
    credentials: '',
    email: '',
  });

  constructor() {
    void this.loaded.again();
  }

  protected says(roles: readonly string[]): string {
    return roles.map(roleSays).join(', ');
  }

  protected turn(role: string): void {
    this.chosen.update((roles) =>
      roles.includes(role) ? roles.filter((one) => one !== role) : [...roles, role],
    );
  }

  protected async submit(): Promise<void> {
    if (this.isBusy()) return;
    const parsed = addStaffRequest.safeParse({
      ...this.form.getRawValue(),
      roles: this.chosen(),
    });
    if (!parsed.success) {
      this.faults.set(
        new Map(
          parsed.error.issues.map(({ path, message }) => [path.join('.'), schemaSentence(message)]),
        ),
      );
      return;
    }
    this.isBusy.set(true);
    this.faults.set(new Map());
    try {
      const { invitationLink } = await this.client.addStaff(parsed.data);
      this.invitation.set(invitationLink);
      this.form.reset();
      this.chosen.set([]);
      await this.loaded.again();
    } catch (error) {
      const failure = clinicFailure(error);
      this.faults.set(new Map([['', failure.message], ...failure.fields]));
    } finally {
      this.isBusy.set(false);
    }
  }
}
