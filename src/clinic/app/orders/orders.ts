import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { ChildrenClient } from '../../../common/api/clinic/children-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { StateMark } from '../../../common/ui/state-mark/state-mark';

/** Orders and what still stands between each and its mornings. */
@Component({
  selector: 'td-orders',
  imports: [RouterLink, SheetStates, StateMark, MomentPipe],
  template: `
    <div class="lead">
      <h1 tabindex="-1" i18n="@@clinic.orders.heading">Orders</h1>
    </div>
    <td-sheet-states [loaded]="loaded">
      <ul class="sheet">
        @for (order of orders(); track order.id) {
          <li class="order">
            <a class="name" [routerLink]="['/orders', order.id]">{{ order.childName }}</a>
            <div>
              <p>{{ order.reason }}</p>
              <p class="told" i18n="@@clinic.orders.by">
                {{ order.orderedByName }}, {{ order.createdAt | tdMoment: zone() }}
              </p>
            </div>
            <div>
              @for (line of order.stillNeeded; track line) {
                <p class="is-care"><td-state-mark name="todo" /> {{ line }}</p>
              } @empty {
                @if (order.seriesId) {
                  <p class="is-well">
                    <td-state-mark name="yes" />&ngsp;<ng-container i18n="@@clinic.orders.planned"
                      >Planned</ng-container
                    >
                  </p>
                } @else {
                  <a
                    class="do first"
                    routerLink="/series/plan"
                    [queryParams]="{ orders: order.id }"
                    i18n="@@clinic.orders.plan"
                    >Choose the mornings</a
                  >
                }
              }
            </div>
          </li>
        } @empty {
          <li class="none" i18n="@@clinic.orders.none">
            No order yet. An order begins on the child’s record.
          </li>
        }
      </ul>
    </td-sheet-states>
  `,
  styleUrl: './orders.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Orders {
  private readonly client = inject(ChildrenClient);

  protected readonly zone = inject(ClinicUser).zone;
  protected readonly loaded = new Loaded(() => this.client.orders());
  /** What waits for somebody stands first; within that the order of the answer. */
  protected readonly orders = computed(() => {
    const orders = this.loaded.value()?.orders ?? [];
    return [
      ...orders.filter(({ seriesId }) => !seriesId),
      ...orders.filter(({ seriesId }) => seriesId),
    ];
  });

  constructor() {
    void this.loaded.again();
  }
}
