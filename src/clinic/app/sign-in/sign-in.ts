import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  inject,
  input,
  signal,
  viewChild,
} from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { Router } from '@angular/router';
import { signInRequest } from '../../../../shared/contracts/clinic-session';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { ClinicUser } from '../../../common/session/clinic-user';
import { schemaSentence } from '../../../common/ui/form/schema-sentences';

@Component({
  selector: 'td-sign-in',
  imports: [ReactiveFormsModule],
  templateUrl: './sign-in.html',
  styleUrl: './sign-in.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignIn {
  private readonly user = inject(ClinicUser);
  private readonly router = inject(Router);
  private readonly summary = viewChild<ElementRef<HTMLElement>>('summary');

  /** Where to go afterwards; only a path of this application. */
  readonly back = input<string>('');
  protected readonly form = inject(NonNullableFormBuilder).group({ email: '', password: '' });
  protected readonly isBusy = signal(false);
  protected readonly says = signal<string | null>(null);
  protected readonly fields = signal<ReadonlyMap<string, string>>(new Map());

  protected async submit(): Promise<void> {
    if (this.isBusy()) return;
    const parsed = signInRequest.safeParse(this.form.getRawValue());
    if (!parsed.success) {
      const found = parsed.error.issues.map(
        (issue) => [issue.path.join('.'), schemaSentence(issue.message)] as const,
      );
      this.show($localize`:@@clinic.sign-in.check:Check what you filled in.`, new Map(found));
      return;
    }
    this.isBusy.set(true);
    try {
      await this.user.signIn(parsed.data.email, parsed.data.password);
      const back = this.back() ?? '';
      await this.router.navigateByUrl(/^\/(?!\/)/.test(back) ? back : '/');
    } catch (error) {
      const failure = clinicFailure(error);
      this.show(failure.message, failure.fields);
    } finally {
      this.isBusy.set(false);
    }
  }

  private show(says: string, fields: ReadonlyMap<string, string>): void {
    this.says.set(says);
    this.fields.set(fields);
    setTimeout(() => this.summary()?.nativeElement.focus());
  }
}
