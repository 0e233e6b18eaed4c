import { ChangeDetectionStrategy, Component, inject, input, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { RouterLink } from '@angular/router';
import { acceptStaffInvitationRequest } from '../../../../shared/contracts/clinic-session';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { ClinicSessionClient } from '../../../common/api/clinic/clinic-session-client';
import { schemaSentence } from '../../../common/ui/form/schema-sentences';

/** A new member of staff chooses a password; the link works once. */
@Component({
  selector: 'td-join',
  imports: [ReactiveFormsModule, RouterLink],
  templateUrl: './join.html',
  styleUrl: './sign-in.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Join {
  private readonly client = inject(ClinicSessionClient);

  readonly token = input.required<string>();
  protected readonly form = inject(NonNullableFormBuilder).group({ password: '' });
  protected readonly isBusy = signal(false);
  protected readonly isDone = signal(false);
  protected readonly says = signal<string | null>(null);

  protected async submit(): Promise<void> {
    if (this.isBusy()) return;
    const request = { token: this.token(), ...this.form.getRawValue() };
    const parsed = acceptStaffInvitationRequest.safeParse(request);
    if (!parsed.success) {
      this.says.set(schemaSentence(parsed.error.issues[0]?.message ?? ''));
      return;
    }
    this.isBusy.set(true);
    try {
      await this.client.acceptInvitation(request.token, request.password);
      this.isDone.set(true);
    } catch (error) {
      const failure = clinicFailure(error);
      this.says.set(failure.fields.get('password') ?? failure.message);
    } finally {
      this.isBusy.set(false);
    }
  }
}
