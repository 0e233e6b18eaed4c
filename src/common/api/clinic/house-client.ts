import { Injectable, inject } from '@angular/core';
import { wordingList, type WordingList } from '../../../../shared/contracts/messages';
import { accessRecordList, type AccessRecordList } from '../../../../shared/contracts/set-up';
import { ClinicHttp } from './clinic-http';

/** The house itself: what went out, its words and its access record. */
@Injectable({ providedIn: 'root' })
export class HouseClient {
  private readonly http = inject(ClinicHttp);

  wordings(): Promise<WordingList> {
    return this.http.get('/wordings', wordingList);
  }

  accessRecord(filter: { childId?: number }): Promise<AccessRecordList> {
    const query = filter.childId === undefined ? '' : `?childId=${filter.childId}`;
    return this.http.get(`/access-record${query}`, accessRecordList);
  }
}
