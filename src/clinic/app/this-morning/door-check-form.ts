import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  afterNextRender,
  computed,
  inject,
  input,
  type OnInit,
  output,
  signal,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { map, startWith } from 'rxjs';
import type { DoorCheckRequest, MorningRow } from '../../../../shared/contracts/this-morning';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { clockIn } from '../../../common/ui/clinic-times';
import {
  doorCheckRequestOf,
  doorCheckStart,
  drinkItems,
  emptyDoorCheck,
  fieldOf,
  isDrink,
  isMeal,
  mealItems,
  somebodyElse,
  type DoorCheckFaults,
} from './door-check-request';
import { DoorTimeField } from './door-time-field';

/** What the nurse hears at the door: six answers, prefilled from home. It opens "begin". */
@Component({
  selector: 'td-door-check-form',
  imports: [DoorTimeField, ReactiveFormsModule],
  templateUrl: './door-check-form.html',
  styleUrl: './door-check-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DoorCheckForm implements OnInit {
  private readonly element = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly clock = inject(ClinicClock);

  readonly row = input.required<MorningRow>();
  readonly zone = input.required<string>();
  readonly isBusy = input(false);
  /** Who may go on against the plan's hours. */
  readonly mayGoOn = input(false);
  /** What the server said beside fields, by path of the request. */
  readonly refused = input<ReadonlyMap<string, string>>(new Map());
  readonly send = output<DoorCheckRequest>();
  readonly leave = output<void>();

  protected readonly form = inject(NonNullableFormBuilder).group({ ...emptyDoorCheck });
  protected readonly values = toSignal(
    this.form.valueChanges.pipe(
      startWith(null),
      map(() => this.form.getRawValue()),
    ),
    { requireSync: true },
  );
  protected readonly somebodyElse = somebodyElse;
  protected readonly items = [...mealItems, ...drinkItems].map((value) => ({
    value,
    says: itemWords[value],
  }));
  protected readonly isMeal = computed(() => isMeal(this.values().intake));
  protected readonly isDrink = computed(() => isDrink(this.values().intake));
  private readonly missing = signal<DoorCheckFaults>({});
  protected readonly faults = computed<DoorCheckFaults>(() => ({
    ...Object.fromEntries([...this.refused()].map(([path, says]) => [fieldOf(path), says])),
    ...this.missing(),
  }));
  protected readonly isRefused = computed(() => Object.keys(this.faults()).length > 0);
  protected readonly planStop = computed(() => {
    const at = this.row().planStopAt;
    return at === null ? null : clockIn(at, this.zone());
  });
  protected readonly people = computed(() => {
    const row = this.row();
    const known = row.phones.map(({ relationship, name }) => `${relationship}, ${name}`);
    return [...new Set([...(row.escort === null ? [] : [row.escort]), ...known])].slice(0, 4);
  });
  protected readonly isPrefilled = computed(() => this.row().told !== null);

  constructor() {
    afterNextRender(() =>
      this.element.nativeElement.querySelector<HTMLElement>('h4')?.focus({ preventScroll: false }),
    );
  }

  ngOnInit(): void {
    this.form.patchValue(doorCheckStart(this.row(), this.zone()));
  }

  protected keep(event: Event): void {
    event.preventDefault();
    const answer = doorCheckRequestOf(this.form.getRawValue(), {
      version: this.row().version,
      now: this.clock.now(),
      zone: this.zone(),
    });
    if ('request' in answer) {
      this.missing.set({});
      this.send.emit(answer.request);
      return;
    }
    this.missing.set(answer.faults);
    const [first] = Object.keys(answer.faults);
    setTimeout(() =>
      this.element.nativeElement.querySelector<HTMLElement>(`[data-field="${first}"]`)?.focus(),
    );
  }
}

const itemWords: Readonly<
  Record<(typeof mealItems)[number] | (typeof drinkItems)[number], string>
> = {
  'breast-milk': $localize`:@@clinic.door.item.breast-milk:Breast milk`,
  formula: $localize`:@@clinic.door.item.formula:Formula`,
  'cows-milk': $localize`:@@clinic.door.item.cows-milk:Cow’s milk`,
  'solid-food': $localize`:@@clinic.door.item.solid-food:Food`,
  'tube-feed': $localize`:@@clinic.door.item.tube-feed:Tube feed`,
  water: $localize`:@@clinic.door.item.water:Water only`,
  other: $localize`:@@clinic.door.item.other:Another drink`,
};
