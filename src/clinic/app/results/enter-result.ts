import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import {
  enterResultRequest,
  type EnterResultRequest,
  type Specimen,
  type TestKind,
} from '../../../../shared/contracts/specimens';
import { dayOf } from '../../../../shared/domain/zone';
import type { ClinicFailure } from '../../../common/api/clinic/clinic-http';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { answersOf, testWords } from './result-words';
import { schemaSentence } from '../../../common/ui/form/schema-sentences';

/** One answer from the laboratory's report: the schema decides, each fault stands beside its field. */
@Component({
  selector: 'td-enter-result',
  imports: [ReactiveFormsModule],
  templateUrl: './enter-result.html',
  styleUrl: './enter-result.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EnterResult {
  private readonly clock = inject(ClinicClock);

  readonly specimen = input.required<Specimen>();
  readonly isBusy = input(false);
  readonly failure = input<ClinicFailure | null>(null);
  readonly entered = output<EnterResultRequest>();
  readonly left = output<void>();

  protected readonly tests = testWords;
  protected readonly test = signal<TestKind>('culture');
  protected readonly answers = computed(() => answersOf(this.test()));
  protected readonly faults = signal<ReadonlyMap<string, string>>(new Map());
  protected readonly form = inject(NonNullableFormBuilder).group({
    value: '',
    finality: '',
    // The clinic's day: in the evening the day of UTC is tomorrow's already.
    reportedOn: dayOf(this.clock.now(), inject(ClinicUser).zone()),
    correctionReason: '',
  });
  protected readonly isCorrection = computed(() =>
    (this.specimen().results ?? []).some(
      (result) => result.test === this.test() && result.finality === 'final',
    ),
  );

  constructor() {
    effect(() => {
      const failure = this.failure();
      if (failure) this.faults.set(new Map([['', failure.message], ...failure.fields]));
    });
  }

  protected choose(test: string): void {
    this.test.set(test as TestKind);
    this.form.patchValue({ value: '', finality: test === 'culture' ? '' : 'final' });
  }

  protected submit(): void {
    const parsed = enterResultRequest.safeParse({ test: this.test(), ...this.form.getRawValue() });
    if (!parsed.success) {
      const says = parsed.error.issues.map(({ path, message }): [string, string] => {
        const field = path.join('.');
        const isChoice = field === 'value' || field === 'finality';
        return [
          field,
          isChoice ? $localize`:@@clinic.results.choose:Choose one.` : schemaSentence(message),
        ];
      });
      this.faults.set(new Map(says));
      return;
    }
    this.faults.set(new Map());
    this.entered.emit(parsed.data);
  }
}
