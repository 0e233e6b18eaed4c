import { Injectable, inject, signal } from '@angular/core';
import { ChildrenClient } from '../../../common/api/clinic/children-client';

export interface Escort {
  readonly id: number;
  readonly says: string;
  readonly mayConsent: boolean;
}

/** The family of the children that are planned: who can bring them, and brothers and sisters who could come too. */
@Injectable()
export class PlanFamily {
  private readonly client = inject(ChildrenClient);

  readonly escorts = signal<readonly Escort[]>([]);
  readonly siblings = signal<readonly { readonly orderId: number; readonly says: string }[]>([]);

  async learn(childId: number, plannedOrderIds: readonly number[]): Promise<void> {
    try {
      const record = await this.client.record(childId);
      this.escorts.set(
        record.familyMembers.map((member) => ({
          id: member.id,
          says: `${member.fullName}, ${member.relationship}`,
          mayConsent: member.mayConsent,
        })),
      );
      const { orders } = await this.client.orders();
      const siblings = new Set(record.siblings.map((sibling) => sibling.id));
      this.siblings.set(
        orders
          .filter((order) => siblings.has(order.childId) && order.stillNeeded.length === 0)
          .filter((order) => order.seriesId === null && !plannedOrderIds.includes(order.id))
          .map((order) => ({ orderId: order.id, says: order.childName })),
      );
    } catch {
      // Without the family the mornings can still be chosen; who brings the child is asked later.
    }
  }
}
