import { Injectable, inject } from '@angular/core';
import {
  contactConsents,
  type ContactConsents,
  type SetContactConsentsRequest,
} from '../../../../shared/contracts/contact-consents';
import {
  messageList,
  outboxState,
  type MessageList,
  type MessagesQuery,
  type OutboxState,
} from '../../../../shared/contracts/messages';
import { ClinicHttp } from './clinic-http';

/** What went out to families, whether anything goes out at all, and what each adult agreed to. */
@Injectable({ providedIn: 'root' })
export class MessagesClient {
  private readonly http = inject(ClinicHttp);

  list({ childId, show, channel }: MessagesQuery): Promise<MessageList> {
    const query = new URLSearchParams({ show });
    if (childId !== null) query.set('childId', String(childId));
    if (channel !== null) query.set('channel', channel);
    return this.http.get(`/messages?${query}`, messageList);
  }

  retry(messageId: number): Promise<OutboxState> {
    return this.http.post(`/messages/${messageId}/retries`, {}, outboxState);
  }

  outbox(): Promise<OutboxState> {
    return this.http.get('/outbox', outboxState);
  }

  consents(familyMemberId: number): Promise<ContactConsents> {
    return this.http.get(`/family-members/${familyMemberId}/consents`, contactConsents);
  }

  setConsents(
    familyMemberId: number,
    request: SetContactConsentsRequest,
  ): Promise<ContactConsents> {
    return this.http.post(`/family-members/${familyMemberId}/consents`, request, contactConsents);
  }
}
