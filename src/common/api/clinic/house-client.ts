import { Injectable, inject } from '@angular/core';
import {
  messageList,
  type MessageList,
  wordingList,
  type WordingList,
} from '../../../../shared/contracts/messages';
import {
  accessRecordList,
  type AccessRecordList,
  setUp,
  type SetUp,
} from '../../../../shared/contracts/set-up';
import { ClinicHttp } from './clinic-http';

/** The house itself: what went out, its words, its set-up and its access record. */
@Injectable({ providedIn: 'root' })
export class HouseClient {
  private readonly http = inject(ClinicHttp);

  messages(): Promise<MessageList> {
    return this.http.get('/messages', messageList);
  }

  wordings(): Promise<WordingList> {
    return this.http.get('/wordings', wordingList);
  }

  setUp(): Promise<SetUp> {
    return this.http.get('/set-up', setUp);
  }

  accessRecord(filter: { childId?: number }): Promise<AccessRecordList> {
    const query = filter.childId === undefined ? '' : `?childId=${filter.childId}`;
    return this.http.get(`/access-record${query}`, accessRecordList);
  }
}
