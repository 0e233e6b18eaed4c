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
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import type { EndCollectionRequest, MorningRow } from '../../../../shared/contracts/this-morning';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { collectionFieldOf, collectionRequestOf, emptyCollection } from './collection-request';
import { fieldTime } from './door-time';

/** What was collected. Numbers outside the laboratory's profile warn afterwards and never block care. */
@Component({
  selector: 'td-collection-form',
  imports: [ReactiveFormsModule],
  templateUrl: './collection-form.html',
  styleUrl: './door-check-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CollectionForm implements OnInit {
  private readonly element = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly clock = inject(ClinicClock);

  readonly row = input.required<MorningRow>();
  readonly zone = input.required<string>();
  readonly isBusy = input(false);
  readonly refused = input<ReadonlyMap<string, string>>(new Map());
  /** With what the last specimen at this screen was neutralised. */
  readonly lastAgent = input('');
  readonly send = output<EndCollectionRequest>();
  readonly leave = output<void>();

  protected readonly form = inject(NonNullableFormBuilder).group({ ...emptyCollection });
  private readonly missing = signal<Readonly<Record<string, string>>>({});
  protected readonly faults = computed<Readonly<Record<string, string>>>(() => ({
    ...Object.fromEntries(
      [...this.refused()].map(([path, says]) => [collectionFieldOf(path), says]),
    ),
    ...this.missing(),
  }));
  protected readonly positions: readonly string[] = [
    $localize`:@@clinic.collection.by-ph:pH of the aspirate`,
    $localize`:@@clinic.collection.by-look:Aspirate looks like stomach juice`,
    $localize`:@@clinic.collection.by-length:Measured length`,
    $localize`:@@clinic.collection.by-x-ray:X-ray`,
  ];
  protected readonly tolerances: readonly string[] = [
    $localize`:@@clinic.collection.tolerated:Tolerated well`,
    $localize`:@@clinic.collection.cried:Cried, calm soon`,
    $localize`:@@clinic.collection.nosebleed:Nosebleed`,
    $localize`:@@clinic.collection.vomited:Vomited`,
  ];

  constructor() {
    afterNextRender(() =>
      this.element.nativeElement.querySelector<HTMLElement>('[data-field="volumeMl"]')?.focus(),
    );
  }

  ngOnInit(): void {
    this.form.patchValue({
      collectedTime: fieldTime(this.clock.instant(), this.zone()),
      neutralisedWith: this.lastAgent(),
    });
  }

  protected keep(event: Event): void {
    event.preventDefault();
    const answer = collectionRequestOf(this.form.getRawValue(), {
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
