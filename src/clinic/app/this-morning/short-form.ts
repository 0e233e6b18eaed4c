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

export type ShortAsk = 'not-collected' | 'neutralise' | 'label' | 'go-on';

/**
 * One answer in a row: why nothing was collected, with what a specimen was neutralised, the scanned label, or why a
 * clinician goes on past the longest fast.
 */
@Component({
  selector: 'td-short-form',
  template: `<form class="asks" novalidate (submit)="keep($event)">
    @if (ask() === 'not-collected') {
      <fieldset>
        <legend i18n="@@clinic.short.why">Why was nothing collected from {{ name() }}?</legend>
        <div class="taps">
          @for (reason of reasons; track reason) {
            <label class="tap">
              <input
                type="radio"
                name="reason"
                [value]="reason"
                [checked]="chosen() === reason"
                (change)="choose(reason)"
              />
              {{ reason }}
            </label>
          }
          <label class="tap">
            <input
              type="radio"
              name="reason"
              value="other"
              [checked]="isOther()"
              (change)="isOther.set(true); chosen.set('')"
            />
            <ng-container i18n="@@clinic.short.other">Another reason</ng-container>
          </label>
        </div>
      </fieldset>
    }
    @if (hasText()) {
      <label class="field">
        <span class="ask-word">{{ question() }}</span>
        <input
          #text
          maxlength="200"
          autocomplete="off"
          [value]="chosen()"
          (input)="chosen.set(text.value)"
          [attr.aria-invalid]="fault() ? true : null"
        />
      </label>
    }
    <p class="field-says" role="alert">{{ fault() }}</p>
    <div class="asks-end">
      <button class="do first" type="submit" [disabled]="isBusy()">{{ sends() }}</button>
      <button class="do" type="button" (click)="leave.emit()" i18n="@@clinic.door.leave">
        Close without keeping
      </button>
      <ng-content />
    </div>
  </form>`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ShortForm implements OnInit {
  private readonly element = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly ask = input.required<ShortAsk>();
  readonly name = input.required<string>();
  readonly isBusy = input(false);
  readonly start = input('');
  readonly refused = input<string>();
  readonly send = output<string>();
  readonly leave = output<void>();

  protected readonly chosen = signal('');
  protected readonly isOther = signal(false);
  private readonly missing = signal('');
  protected readonly fault = computed(() => this.missing() || (this.refused() ?? ''));
  protected readonly hasText = computed(() => this.ask() !== 'not-collected' || this.isOther());
  protected readonly question = computed(() => {
    switch (this.ask()) {
      case 'not-collected':
        return $localize`:@@clinic.short.which-reason:Which reason`;
      case 'neutralise':
        return $localize`:@@clinic.short.agent:${this.name()}:name:: neutralised with`;
      case 'go-on':
        return $localize`:@@clinic.short.go-on:${this.name()}:name:: why go on although the longest fast has passed?`;
      case 'label':
        return $localize`:@@clinic.short.scan:${this.name()}:name:: scan the label`;
    }
  });
  protected readonly sends = computed(() => {
    switch (this.ask()) {
      case 'not-collected':
        return $localize`:@@clinic.short.keep-reason:Keep: not collected`;
      case 'neutralise':
        return $localize`:@@clinic.this-morning.neutralised-now:Neutralised now`;
      case 'go-on':
        return $localize`:@@clinic.short.begin:Go on and begin`;
      case 'label':
        return $localize`:@@clinic.short.keep-label:Keep this label`;
    }
  });
  /** Five, and another one: six at the most, so that they can be read with gloves on. */
  protected readonly reasons: readonly string[] = [
    $localize`:@@clinic.short.not-empty:Stomach not empty`,
    $localize`:@@clinic.short.no-fluid:No fluid came`,
    $localize`:@@clinic.short.no-passage:Tube did not pass, or nosebleed`,
    $localize`:@@clinic.short.not-well:Child not well enough`,
    $localize`:@@clinic.short.family:The family wished to end it`,
  ];

  constructor() {
    afterNextRender(() => this.element.nativeElement.querySelector('input')?.focus());
  }

  ngOnInit(): void {
    this.chosen.set(this.start());
  }

  protected choose(reason: string): void {
    this.isOther.set(false);
    this.chosen.set(reason);
  }

  protected keep(event: Event): void {
    event.preventDefault();
    const text = this.chosen().trim();
    this.missing.set(
      text === '' ? $localize`:@@clinic.short.fill-in:Say this first, then keep it.` : '',
    );
    if (text !== '') this.send.emit(text);
    else this.element.nativeElement.querySelector('input')?.focus();
  }
}
