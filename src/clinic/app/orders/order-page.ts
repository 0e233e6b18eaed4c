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
} from '@angular/core';
import { RouterLink } from '@angular/router';
import type { ProcedureConsentRequest } from '../../../../shared/contracts/orders';
import { ChildrenClient } from '../../../common/api/clinic/children-client';
import { type ClinicFailure, clinicFailure } from '../../../common/api/clinic/clinic-http';
import { ClinicUser } from '../../../common/session/clinic-user';
import { DayPipe, MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { ConsentForm } from './consent-form';

/** One order: the clinician signs it, a guardian's consent is recorded, then the mornings are chosen. */
@Component({
  selector: 'td-order-page',
  imports: [RouterLink, SheetStates, DayPipe, MomentPipe, ConsentForm],
  templateUrl: './order-page.html',
  styleUrl: './order-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class OrderPage {
  private readonly client = inject(ChildrenClient);
  private readonly user = inject(ClinicUser);

  readonly orderId = input.required({ transform: numberAttribute });
  protected readonly zone = this.user.zone;
  protected readonly loaded = new Loaded(async () => {
    const order = await this.client.order(this.orderId());
    const record = await this.client.record(order.childId);
    const consenting = record.familyMembers.filter((member) => member.mayConsent);
    return { order, consenting };
  });
  protected readonly order = computed(() => this.loaded.value()?.order ?? null);
  protected readonly consenting = computed(() => this.loaded.value()?.consenting ?? []);
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<ClinicFailure | null>(null);
  protected readonly maySign = computed(() => this.user.has('orders.sign'));
  protected readonly mayConsent = computed(() => this.user.has('consents.write'));
  protected readonly mayPlan = computed(() => this.user.has('series.plan'));
  protected readonly details = computed(() => {
    const details = this.order()?.details;
    if (!details) return [];
    const flags: readonly (readonly [boolean, string])[] = [
      [details.sourceCase === 'known', $localize`:@@clinic.order.source-known:Source case known`],
      [
        details.sourceSusceptibility === 'resistant',
        $localize`:@@clinic.order.source-resistant:Source case resistant`,
      ],
      [details.hasBleedingHistory, $localize`:@@clinic.order.bleeding:Bleeding history`],
      [details.hasNoseOrAirwayTrouble, $localize`:@@clinic.order.nose:Nose or airway trouble`],
      [details.hasRecentSurgery, $localize`:@@clinic.order.surgery:Recent surgery`],
      [
        details.hasInfectiousContactAtHome,
        $localize`:@@clinic.order.contact:Infectious contact at home`,
      ],
    ];
    return flags.flatMap(([is, says]) => (is ? [says] : []));
  });

  constructor() {
    effect(() => {
      this.orderId();
      untracked(() => void this.loaded.again());
    });
  }

  protected sign(version: number): Promise<void> {
    return this.act(() => this.client.signOrder(this.orderId(), version));
  }

  protected consent(request: ProcedureConsentRequest): Promise<void> {
    return this.act(() => this.client.consent(this.orderId(), request));
  }

  protected reported(): Promise<void> {
    return this.act(() => this.client.reported(this.orderId()));
  }

  private async act(work: () => Promise<unknown>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      await work();
    } catch (error) {
      this.failure.set(clinicFailure(error));
    } finally {
      this.isBusy.set(false);
      await this.loaded.again();
    }
  }
}
