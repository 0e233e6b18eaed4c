import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { ReplanOutcome } from '../../../../shared/contracts/replan';
import { DayPipe } from '../../../common/ui/clinic-times';
import { changeSays, stateSays } from './replan-words';

/** Each child's mornings before and after a change, in order of days; what changes carries a mark and a word. */
@Component({
  selector: 'td-before-after',
  imports: [DayPipe],
  template: `
    @for (child of children(); track child.seriesId) {
      <table>
        <caption>
          {{
            child.fullName
          }}
        </caption>
        <thead>
          <tr>
            <th scope="col" i18n="@@clinic.replan.number">Number</th>
            <th scope="col" i18n="@@clinic.replan.before">Before</th>
            <th scope="col" i18n="@@clinic.replan.after">After</th>
          </tr>
        </thead>
        <tbody>
          @for (morning of child.after; track $index) {
            <tr [attr.data-change]="morning.change">
              <td class="number">
                @if (morning.was && morning.was.number !== morning.number) {
                  <s>{{ morning.was.number }}</s>
                  {{ ' ' }}
                }
                {{ morning.number }}
              </td>
              @switch (morning.change) {
                @case ('new') {
                  <td></td>
                  <td>
                    <b>{{ morning.on | tdDay }}</b> {{ morning.arrivalTime }}
                    <span class="word is-well">＋ {{ changeSays[morning.change] }}</span>
                  </td>
                }
                @case ('given-up') {
                  <td>{{ morning.on | tdDay }} {{ morning.arrivalTime }}</td>
                  <td>
                    <s>{{ morning.on | tdDay }}</s>
                    <span class="word is-care">✕ {{ changeSays[morning.change] }}</span>
                  </td>
                }
                @case ('moved') {
                  <td>{{ morning.was?.on | tdDay }} {{ morning.was?.arrivalTime }}</td>
                  <td>
                    <b>{{ morning.on | tdDay }}</b> {{ morning.arrivalTime }}
                    <span class="word is-ink">→ {{ changeSays[morning.change] }}</span>
                  </td>
                }
                @default {
                  <td>{{ morning.on | tdDay }} {{ morning.arrivalTime }}</td>
                  <td>
                    {{ morning.on | tdDay }} {{ morning.arrivalTime }}
                    <span class="word told">
                      {{
                        morning.state === 'planned'
                          ? changeSays[morning.change]
                          : stateSays[morning.state]
                      }}
                    </span>
                  </td>
                }
              }
            </tr>
          }
        </tbody>
      </table>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: var(--space-3);
    }
    table {
      width: 100%;
      border-collapse: collapse;
    }
    caption {
      padding-bottom: 0.2rem;
      font-weight: 700;
      text-align: start;
    }
    th {
      color: var(--text-soft);
      font-weight: 400;
      font-size: var(--step--2);
      text-align: start;
    }
    th,
    td {
      padding: 0.3rem var(--space-2) 0.3rem 0;
      border-bottom: var(--rule);
      vertical-align: top;
    }
    .number {
      font-weight: 700;
      font-variant-numeric: tabular-nums;
      white-space: nowrap;
    }
    .word {
      display: block;
      font-size: var(--step--2);
      font-weight: 700;
    }
    .word.told {
      font-weight: 400;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BeforeAfter {
  readonly children = input.required<ReplanOutcome['children']>();
  protected readonly changeSays = changeSays;
  protected readonly stateSays = stateSays;
}
