import { Injectable, inject } from '@angular/core';
import {
  alertList,
  onCallList,
  type AlertList,
  type OnCallList,
  type SaveOnCallRequest,
} from '../../../../shared/contracts/alerts';
import { ClinicHttp } from './clinic-http';

/** What cannot wait, and who is on call. Every change answers with what is then. */
@Injectable({ providedIn: 'root' })
export class AlertsClient {
  private readonly http = inject(ClinicHttp);

  list(): Promise<AlertList> {
    return this.http.get('/alerts', alertList);
  }

  take(id: number): Promise<AlertList> {
    return this.http.post(`/alerts/${id}/take`, {}, alertList);
  }

  passOn(id: number): Promise<AlertList> {
    return this.http.post(`/alerts/${id}/pass-on`, {}, alertList);
  }

  /** @param siteId the own site when null */
  onCall(siteId: number | null): Promise<OnCallList> {
    return this.http.get(siteId === null ? '/on-call' : `/on-call?siteId=${siteId}`, onCallList);
  }

  saveOnCall(siteId: number, request: SaveOnCallRequest): Promise<OnCallList> {
    return this.http.put(`/on-call/${siteId}`, request, onCallList);
  }
}
