import { ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import type { NextStep, Offer } from './next-step';

/** The next action only; what is rarer stands under "More". Filled in the suggested row alone. */
@Component({
  selector: 'td-row-acts',
  template: `
    @if (step().says) {
      <p>{{ step().says }}</p>
    }
    <div class="acts" [class.choose]="step().isPair">
      @for (offer of step().offers; track offer.act + offer.says; let index = $index) {
        @if (offer.act === 'call') {
          <a class="do" [href]="'tel:' + offer.phone"
            >{{ offer.says
            }}<span class="unseen" i18n="@@clinic.this-morning.for">, for {{ name() }}</span></a
          >
        } @else {
          <button
            class="do"
            type="button"
            [class.first]="isNext() && index < step().filled"
            [class.pair]="step().isPair"
            [disabled]="isBusy()"
            (click)="act.emit(offer)"
          >
            @if (offer.leadsTo) {
              <b
                >{{ offer.says }}<span class="unseen">, {{ name() }}:</span></b
              >
              {{ offer.leadsTo }}
            } @else {
              {{ offer.says }}<span class="unseen">, {{ name() }}</span>
            }
          </button>
        }
      }
      @if (step().more.length > 0) {
        <details class="more">
          <summary>
            <ng-container i18n="@@clinic.this-morning.more">More</ng-container
            ><span class="unseen" i18n="@@clinic.this-morning.more-for"> for {{ name() }}</span>
          </summary>
          <ul>
            @for (offer of step().more; track offer.act + offer.says) {
              <li>
                @if (offer.act === 'call') {
                  <a class="do" [href]="'tel:' + offer.phone">{{ offer.says }}</a>
                } @else {
                  <button class="do" type="button" [disabled]="isBusy()" (click)="act.emit(offer)">
                    {{ offer.says }}<span class="unseen">, {{ name() }}</span>
                  </button>
                }
              </li>
            }
          </ul>
        </details>
      }
    </div>
  `,
  styles: `
    :host {
      display: block;
    }
    p {
      margin-bottom: 0.35rem;
    }
    .acts {
      display: flex;
      flex-wrap: wrap;
      gap: 0.35rem var(--space-2);
    }
    .more[open],
    .choose .more {
      flex-basis: 100%;
    }
    @media print {
      .acts {
        display: none;
      }
    }
    @media screen and (max-width: 46rem) {
      .acts > .do {
        flex: 1 1 auto;
      }
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RowActs {
  readonly step = input.required<NextStep>();
  readonly name = input.required<string>();
  readonly isNext = input(false);
  readonly isBusy = input(false);
  readonly act = output<Offer>();
}
