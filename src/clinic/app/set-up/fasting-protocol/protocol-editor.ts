import {
  ChangeDetectionStrategy,
  Component,
  LOCALE_ID,
  computed,
  effect,
  inject,
  input,
  numberAttribute,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { toObservable, takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { ReactiveFormsModule } from '@angular/forms';
import { Router, RouterLink } from '@angular/router';
import { Subject, debounceTime, merge, switchMap } from 'rxjs';
import type { ProtocolCheck, ProtocolDetail } from '../../../../../shared/contracts/protocols';
import { cautions } from '../../../../../shared/domain/cautions';
import { allowableItems } from '../../../../../shared/domain/fasting-protocol';
import { clinicFailure } from '../../../../common/api/clinic/clinic-http';
import { ProtocolsClient } from '../../../../common/api/clinic/protocols-client';
import { ClinicUser } from '../../../../common/session/clinic-user';
import { MomentPipe } from '../../../../common/ui/clinic-times';
import { Loaded } from '../../../../common/ui/loaded';
import { SheetStates } from '../../../../common/ui/sheet-states/sheet-states';
import { SignVersion } from '../versions/sign-version';
import { faultsByField, stateSays } from '../versions/version-words';
import { BandTable } from './band-table';
import { protocolForm, protocolValues, type ProtocolForm } from './protocol-form';
import { ProtocolPreview, type PreviewWanted } from './protocol-preview';
import { allowableWords, cautionWords } from './protocol-words';

/** Typing rests this long before the server looks at it. */
const restMs = 400;

/** One version: read when it is signed, edited while it is a draft, with its problems and its preview beside. */
@Component({
  selector: 'td-protocol-editor',
  imports: [
    ReactiveFormsModule,
    RouterLink,
    SheetStates,
    BandTable,
    ProtocolPreview,
    SignVersion,
    MomentPipe,
  ],
  templateUrl: './protocol-editor.html',
  styleUrl: './protocol-editor.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ProtocolEditor {
  protected readonly client = inject(ProtocolsClient);
  private readonly user = inject(ClinicUser);
  private readonly router = inject(Router);
  private readonly typed = new Subject<void>();
  private readonly signing = viewChild(SignVersion);

  readonly id = input.required({ transform: numberAttribute });

  protected readonly zone = this.user.zone;
  protected readonly loaded = new Loaded(() => this.client.open(this.id()));
  protected readonly version = this.loaded.value;
  protected readonly form = signal<ProtocolForm | null>(null);
  protected readonly check = signal<ProtocolCheck | null>(null);
  protected readonly faults = signal<ReadonlyMap<string, string>>(new Map());
  protected readonly wanted = signal<PreviewWanted>({
    // What the reader understands first; every other built language is a choice away.
    language: inject(LOCALE_ID).slice(0, 2),
    arrivalTime: '07:00',
    on: null,
  });
  protected readonly isSaved = signal(true);
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<string | null>(null);
  protected readonly hasSigned = signal(false);
  protected readonly mayWrite = computed(
    () => this.user.has('protocols.write') && this.version()?.state === 'draft',
  );
  protected readonly maySign = computed(() => this.user.has('protocols.sign'));
  protected readonly stateSays = stateSays;
  protected readonly allowable = allowableItems.map((item) => ({
    item,
    says: allowableWords[item],
  }));
  protected readonly cautions = cautions.map((item) => ({ item, says: cautionWords[item] }));
  protected readonly save = (): Promise<ProtocolDetail | null> => this.saveNow();

  constructor() {
    effect(() => {
      this.id();
      untracked(() => void this.open());
    });
    merge(this.typed.pipe(debounceTime(restMs)), toObservable(this.wanted))
      .pipe(
        switchMap(() => this.look()),
        takeUntilDestroyed(),
      )
      .subscribe();
  }

  protected async discard(): Promise<void> {
    const version = this.version();
    if (!version) return;
    await this.work(async () => {
      await this.client.discard(version);
      await this.router.navigate(['/set-up/fasting-protocol']);
    });
  }

  protected took(version: ProtocolDetail): void {
    this.show(version);
    this.hasSigned.set(true);
  }

  protected async open(): Promise<void> {
    this.failure.set(null);
    this.hasSigned.set(false);
    await this.loaded.again();
    const version = this.version();
    if (version) this.show(version);
  }

  private async saveNow(): Promise<ProtocolDetail | null> {
    const version = this.version();
    const form = this.form();
    if (!version || !form) return null;
    if (this.isSaved()) return version;
    return this.work(async () => {
      const saved = await this.client.save(version, protocolValues(form));
      // What was typed stays as it is typed; only the version moves on.
      this.loaded.show(saved);
      this.isSaved.set(true);
      this.faults.set(faultsByField(saved.problems.map(({ path, message }) => [path, message])));
      return saved;
    });
  }

  private show(version: ProtocolDetail): void {
    this.loaded.show(version);
    const form = protocolForm(version.values);
    if (!this.mayWrite()) form.disable({ emitEvent: false });
    form.valueChanges.subscribe(() => {
      this.isSaved.set(false);
      this.signing()?.forget();
      this.typed.next();
    });
    this.isSaved.set(true);
    this.form.set(form);
    this.typed.next();
  }

  private async look(): Promise<void> {
    const form = this.form();
    if (!form) return;
    try {
      const check = await this.client.check({
        values: protocolValues(form),
        preview: this.wanted(),
      });
      this.check.set(check);
      this.faults.set(
        this.mayWrite()
          ? faultsByField(check.problems.map(({ path, message }) => [path, message]))
          : new Map(),
      );
    } catch (error) {
      // A field that cannot be read is told beside itself; the rest stays as it was last seen.
      const { fields, status, message } = clinicFailure(error);
      if (status === 422) this.faults.set(faultsByField(fields));
      else this.failure.set(message);
    }
  }

  private async work<Answer>(step: () => Promise<Answer>): Promise<Answer | null> {
    if (this.isBusy()) return null;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      return await step();
    } catch (error) {
      const failure = clinicFailure(error);
      this.failure.set(failure.message);
      if (failure.fields.size > 0) this.faults.set(faultsByField(failure.fields));
      return null;
    } finally {
      this.isBusy.set(false);
    }
  }
}
