import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  numberAttribute,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { ReactiveFormsModule } from '@angular/forms';
import { Router, RouterLink } from '@angular/router';
import { Subject, debounceTime, switchMap } from 'rxjs';
import type { ProfileCheck, ProfileDetail } from '../../../../../shared/contracts/protocols';
import { resultStages } from '../../../../../shared/domain/specimen-clocks';
import { clinicFailure } from '../../../../common/api/clinic/clinic-http';
import { ProfilesClient } from '../../../../common/api/clinic/protocols-client';
import { ClinicUser } from '../../../../common/session/clinic-user';
import { MomentPipe } from '../../../../common/ui/clinic-times';
import { Loaded } from '../../../../common/ui/loaded';
import { SheetStates } from '../../../../common/ui/sheet-states/sheet-states';
import { SignVersion } from '../versions/sign-version';
import { faultsByField, stateSays } from '../versions/version-words';
import { profileForm, profileValues, weekdays, type ProfileForm } from './profile-form';
import { numberWords, stageWords, weekdayWords } from './profile-words';

/** Typing rests this long before the server looks at it. */
const restMs = 400;

/** One version: read when it is signed, edited while it is a draft, with its problems and what is published beside. */
@Component({
  selector: 'td-profile-editor',
  imports: [ReactiveFormsModule, RouterLink, SheetStates, SignVersion, MomentPipe],
  templateUrl: './profile-editor.html',
  styleUrl: './profile-editor.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ProfileEditor {
  protected readonly client = inject(ProfilesClient);
  private readonly user = inject(ClinicUser);
  private readonly router = inject(Router);
  private readonly typed = new Subject<void>();
  private readonly signing = viewChild(SignVersion);

  readonly id = input.required({ transform: numberAttribute });

  protected readonly zone = this.user.zone;
  protected readonly loaded = new Loaded(() => this.client.open(this.id()));
  protected readonly version = this.loaded.value;
  protected readonly form = signal<ProfileForm | null>(null);
  protected readonly check = signal<ProfileCheck | null>(null);
  protected readonly faults = signal<ReadonlyMap<string, string>>(new Map());
  protected readonly isSaved = signal(true);
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<string | null>(null);
  protected readonly hasSigned = signal(false);
  protected readonly mayWrite = computed(
    () => this.user.has('protocols.write') && this.version()?.state === 'draft',
  );
  protected readonly maySign = computed(() => this.user.has('protocols.sign'));
  protected readonly stateSays = stateSays;
  protected readonly weekdays = weekdays.map((weekday) => ({
    key: `${weekday}` as const,
    says: weekdayWords[weekday],
  }));
  protected readonly minutes = [
    'neutraliseWithinMinutes',
    'receiptWithinMinutes',
    'minutesToLaboratory',
    'minimumVolumeMl',
    'maximumVolumeMl',
  ] as const;
  protected readonly numberWords = numberWords;
  protected readonly stages = resultStages;
  protected readonly stageWords = stageWords;
  protected readonly save = (): Promise<ProfileDetail | null> => this.saveNow();

  constructor() {
    effect(() => {
      this.id();
      untracked(() => void this.open());
    });
    this.typed
      .pipe(
        debounceTime(restMs),
        switchMap(() => this.look()),
        takeUntilDestroyed(),
      )
      .subscribe();
  }

  protected published(field: string): ProfileCheck['published'] {
    return (this.check()?.published ?? []).filter((one) => one.field === field);
  }

  protected async discard(): Promise<void> {
    const version = this.version();
    if (!version) return;
    await this.work(async () => {
      await this.client.discard(version);
      await this.router.navigate(['/set-up/laboratory-profile']);
    });
  }

  protected took(version: ProfileDetail): void {
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

  private async saveNow(): Promise<ProfileDetail | null> {
    const version = this.version();
    const form = this.form();
    if (!version || !form) return null;
    if (this.isSaved()) return version;
    return this.work(async () => {
      const saved = await this.client.save(version, profileValues(form));
      // What was typed stays as it is typed; only the version moves on.
      this.loaded.show(saved);
      this.isSaved.set(true);
      this.faults.set(faultsByField(saved.problems.map(({ path, message }) => [path, message])));
      return saved;
    });
  }

  private show(version: ProfileDetail): void {
    this.loaded.show(version);
    const form = profileForm(version.values);
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
      const version = this.version()?.version ?? 1;
      const check = await this.client.check({ version, values: profileValues(form) });
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
