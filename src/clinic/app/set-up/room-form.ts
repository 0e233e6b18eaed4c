import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  type OnInit,
  output,
  signal,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { FormControl, NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatCheckboxModule } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { saveRoomRequest, type SetUp } from '../../../../shared/contracts/set-up';
import {
  airChangesRange,
  clearedPercents,
  closureMinutesOf,
  type ClearedPercent,
} from '../../../../shared/domain/room-closure';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { SetUpClient } from '../../../common/api/clinic/set-up-client';
import { faultOf, issuesByPath, showFaults } from '../../../common/ui/form/form-faults';
import { formFieldLook } from '../../../common/ui/form/form-field-look';

type Room = SetUp['rooms'][number];

/** One room, or a new one: how long it stays closed after a child, in minutes or from its air. */
@Component({
  selector: 'td-room-form',
  imports: [
    MatCheckboxModule,
    MatFormFieldModule,
    MatInputModule,
    MatSelectModule,
    ReactiveFormsModule,
  ],
  templateUrl: './room-form.html',
  styleUrls: ['../../../common/ui/form/fields.scss', './room-form.scss'],
  providers: [formFieldLook],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RoomForm implements OnInit {
  private readonly client = inject(SetUpClient);
  /** One key a form: sending it again after a lost answer makes no second room. */
  private submissionKey = crypto.randomUUID();

  readonly siteId = input.required<number>();
  readonly room = input<Room | null>(null);
  readonly kept = output<SetUp>();

  protected readonly percents = clearedPercents;
  protected readonly faultOf = faultOf;
  protected readonly isBusy = signal(false);
  protected readonly says = signal<readonly string[]>([]);
  protected readonly done = signal(false);
  protected readonly form = inject(NonNullableFormBuilder).group({
    name: '',
    by: new FormControl<'minutes' | 'air'>('minutes', { nonNullable: true }),
    minutes: 60,
    airChangesPerHour: 6,
    clearedPercent: new FormControl<ClearedPercent>(99.9, { nonNullable: true }),
    isInUse: true,
  });
  private readonly value = toSignal(this.form.valueChanges, {
    initialValue: this.form.getRawValue(),
  });
  protected readonly by = computed(() => this.value().by);
  /** Whole minutes by the air, as the server will keep them; null while the number cannot be one. */
  protected readonly computedMinutes = computed(() => {
    const { airChangesPerHour, clearedPercent } = this.value();
    const changes = Number(airChangesPerHour);
    if (!(changes >= airChangesRange.from && changes <= airChangesRange.until)) return null;
    return closureMinutesOf({
      airChangesPerHour: changes,
      clearedPercent: clearedPercent ?? 99.9,
    });
  });

  ngOnInit(): void {
    const room = this.room();
    if (!room) return;
    const { name, closure, closureMinutes, isInUse } = room;
    this.form.patchValue({ name, isInUse, by: closure.by, minutes: closureMinutes });
    if (closure.by === 'air') this.form.patchValue(closure);
  }

  protected async submit(): Promise<void> {
    if (this.isBusy()) return;
    this.done.set(false);
    const { name, isInUse, by, minutes, airChangesPerHour, clearedPercent } =
      this.form.getRawValue();
    const closure = by === 'minutes' ? { by, minutes } : { by, airChangesPerHour, clearedPercent };
    const room = this.room();
    const parsed = saveRoomRequest.safeParse({
      name,
      isInUse,
      closure,
      version: room?.version ?? 1,
    });
    if (!parsed.success) {
      this.refuse(issuesByPath(parsed.error.issues));
      return;
    }
    this.isBusy.set(true);
    this.says.set([]);
    try {
      const setUp = room
        ? await this.client.saveRoom(room.id, parsed.data)
        : await this.client.addRoom({
            siteId: this.siteId(),
            name: parsed.data.name,
            closure: parsed.data.closure,
            submissionKey: this.submissionKey,
          });
      this.done.set(true);
      if (!room) {
        this.submissionKey = crypto.randomUUID();
        this.form.reset();
      }
      this.kept.emit(setUp);
    } catch (error) {
      const failure = clinicFailure(error);
      this.refuse(failure.fields, failure.fields.size > 0 ? [] : [failure.message]);
    } finally {
      this.isBusy.set(false);
    }
  }

  private refuse(faults: ReadonlyMap<string, string>, more: readonly string[] = []): void {
    const own = new Map([...faults].map(([path, says]) => [path.replace('closure.', ''), says]));
    const rest = showFaults(this.form, own);
    const ofUse = own.get('isInUse');
    this.says.set([...more, ...rest, ...(ofUse === undefined ? [] : [ofUse])]);
  }
}
