import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { type FormGroup, ReactiveFormsModule } from '@angular/forms';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { map, startWith, switchMap } from 'rxjs';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { clockIn, dayIn } from '../../../common/ui/clinic-times';
import type { TimeField } from './door-check-request';
import { doorTime } from './door-time';

/**
 * A clock time of last evening or this morning, and which day that is. On the night when the clock changes a time that
 * came twice, or never, is settled by the nurse.
 */
@Component({
  selector: 'td-door-time-field',
  imports: [ReactiveFormsModule],
  template: `<div class="field" [formGroup]="form()">
    <label [attr.for]="id()">{{ label() }}</label>
    <input
      type="time"
      [id]="id()"
      [formControlName]="field()"
      [attr.data-field]="field()"
      [attr.aria-invalid]="fault() ? true : null"
      [attr.aria-describedby]="id() + '-says'"
    />
    <p class="fine" [id]="id() + '-says'">
      @if (fault()) {
        <b class="field-says">{{ fault() }}</b>
      } @else {
        {{ says() }}
      }
    </p>
    @if (choices(); as two) {
      <div class="taps" role="group" [attr.aria-label]="label()">
        @for (one of two; track one.value) {
          <label class="tap">
            <input type="radio" [formControlName]="field() + 'Reading'" [value]="one.value" />
            {{ one.says }}
          </label>
        }
      </div>
    }
  </div>`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DoorTimeField {
  private static count = 0;
  private readonly clock = inject(ClinicClock);
  private readonly number = ++DoorTimeField.count;

  readonly form = input.required<FormGroup>();
  readonly field = input.required<TimeField>();
  readonly label = input.required<string>();
  readonly zone = input.required<string>();
  readonly fault = input<string>();

  protected readonly id = computed(() => `door-${this.field()}-${this.number}`);
  private readonly time = toSignal(
    toObservable(this.form).pipe(
      switchMap((form) => form.valueChanges.pipe(startWith(null))),
      map(() => String(this.form().get(this.field())?.value ?? '')),
    ),
    { initialValue: '' },
  );
  private readonly read = computed(() => doorTime(this.time(), this.clock.time(), this.zone()));
  protected readonly says = computed(() => {
    const read = this.read();
    if (read?.kind !== 'once') return '';
    const at = new Date(read.at).toISOString();
    return `${dayIn(at, this.zone())}, ${clockIn(at, this.zone())}`;
  });
  protected readonly choices = computed(() => {
    const read = this.read();
    if (read === null || read.kind === 'once') return null;
    return read.kind === 'twice'
      ? [
          {
            value: 'earlier',
            says: $localize`:@@clinic.door.before-change:Before the clock changed`,
          },
          { value: 'later', says: $localize`:@@clinic.door.after-change:After the clock changed` },
        ]
      : [
          { value: 'later', says: this.clockWords(read.later) },
          { value: 'earlier', says: this.clockWords(read.earlier) },
        ];
  });

  private clockWords(at: number): string {
    const time = clockIn(new Date(at).toISOString(), this.zone());
    return $localize`:@@clinic.door.meant:Meant ${time}:time:`;
  }
}
