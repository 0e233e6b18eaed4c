import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { FormsModule } from '@angular/forms';
import type { Consequences } from '../../../../../shared/contracts/protocols';
import { clinicFailure, type ClinicFailure } from '../../../../common/api/clinic/clinic-http';
import type { VersionsClient } from '../../../../common/api/clinic/protocols-client';

/** What signing would change, before and after side by side; then the password and the signature. */
@Component({
  selector: 'td-sign-version',
  imports: [FormsModule],
  templateUrl: './sign-version.html',
  styleUrl: './sign-version.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignVersion<Detail extends { readonly id: number; readonly draftVersion: number }> {
  private readonly element = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly client = input.required<VersionsClient<Detail>>();
  /** Saves what is open and answers the draft as it is now; null when it could not be saved. */
  readonly save = input.required<() => Promise<Detail | null>>();
  readonly maySign = input(false);
  readonly signed = output<Detail>();

  protected readonly draft = signal<Detail | null>(null);
  protected readonly found = signal<Consequences | null>(null);
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<ClinicFailure | null>(null);
  protected readonly password = signal('');
  protected readonly passwordFault = computed(() => this.failure()?.fields.get('password'));
  protected readonly canBeSigned = computed(() => this.found()?.problems.length === 0);

  /** What was looked at no longer holds once something is typed. */
  forget(): void {
    this.found.set(null);
    this.failure.set(null);
  }

  protected async look(): Promise<void> {
    await this.work(async () => {
      const draft = await this.save()();
      if (!draft) return;
      this.draft.set(draft);
      this.found.set(await this.client().consequences(draft.id));
      setTimeout(() => this.element.nativeElement.querySelector<HTMLElement>('h3')?.focus());
    });
  }

  protected async sign(): Promise<void> {
    const draft = this.draft();
    if (!draft) return;
    const password = this.password();
    this.password.set('');
    await this.work(async () => {
      const { id, draftVersion } = draft;
      this.signed.emit(await this.client().sign(id, { draftVersion, password }));
    });
  }

  private async work(step: () => Promise<void>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      await step();
    } catch (error) {
      this.failure.set(clinicFailure(error));
    } finally {
      this.isBusy.set(false);
    }
  }
}
