import { Injectable, inject } from '@angular/core';
import {
  childList,
  childRecord,
  sendInvitationAnswer,
  type AddChildRequest,
  type ChangeChildRequest,
  type ChildList,
  type ChildRecord,
  type FamilyMemberInput,
  type SendInvitationAnswer,
} from '../../../../shared/contracts/children';
import {
  order,
  orderList,
  type AddOrderRequest,
  type Order,
  type OrderList,
  type ProcedureConsentRequest,
} from '../../../../shared/contracts/orders';
import { ClinicHttp } from './clinic-http';

/** Children, their families, orders and consents. */
@Injectable({ providedIn: 'root' })
export class ChildrenClient {
  private readonly http = inject(ClinicHttp);

  find(search: string): Promise<ChildList> {
    return this.http.get(`/children?search=${encodeURIComponent(search)}`, childList);
  }

  record(childId: number): Promise<ChildRecord> {
    return this.http.get(`/children/${childId}`, childRecord);
  }

  /** Answers with the new child's record. */
  add(request: AddChildRequest): Promise<ChildRecord> {
    return this.http.post('/children', request, childRecord);
  }

  change(childId: number, request: ChangeChildRequest): Promise<ChildRecord> {
    return this.http.put(`/children/${childId}`, request, childRecord);
  }

  addFamilyMember(childId: number, member: FamilyMemberInput): Promise<ChildRecord> {
    return this.http.post(`/children/${childId}/family-members`, member, childRecord);
  }

  invite(familyMemberId: number): Promise<SendInvitationAnswer> {
    return this.http.post(
      `/family-members/${familyMemberId}/invitations`,
      {},
      sendInvitationAnswer,
    );
  }

  orders(): Promise<OrderList> {
    return this.http.get('/orders', orderList);
  }

  order(orderId: number): Promise<Order> {
    return this.http.get(`/orders/${orderId}`, order);
  }

  addOrder(request: AddOrderRequest): Promise<Order> {
    return this.http.post('/orders', request, order);
  }

  signOrder(orderId: number, version: number): Promise<Order> {
    return this.http.post(`/orders/${orderId}/signature`, { version }, order);
  }

  consent(orderId: number, request: ProcedureConsentRequest): Promise<Order> {
    return this.http.post(`/orders/${orderId}/consent`, request, order);
  }

  reported(orderId: number): Promise<Order> {
    return this.http.post(`/orders/${orderId}/reported`, {}, order);
  }
}
