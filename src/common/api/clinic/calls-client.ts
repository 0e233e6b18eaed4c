import { Injectable, inject } from '@angular/core';
import { callList, type CallDoneRequest, type CallList } from '../../../../shared/contracts/calls';
import { ClinicHttp } from './clinic-http';

/** Calls to make; each write answers with the list as it is now. */
@Injectable({ providedIn: 'root' })
export class CallsClient {
  private readonly http = inject(ClinicHttp);

  list(): Promise<CallList> {
    return this.http.get('/calls', callList);
  }

  claim(callId: number): Promise<CallList> {
    return this.http.post(`/calls/${callId}/claim`, {}, callList);
  }

  done(callId: number, request: CallDoneRequest): Promise<CallList> {
    return this.http.post(`/calls/${callId}/outcome`, request, callList);
  }
}
