import { Injectable, inject } from '@angular/core';
import { done } from '../../../../shared/contracts/common';
import {
  rehearsalState,
  type MoveClockRequest,
  type RehearsalReplyRequest,
  type RehearsalState,
} from '../../../../shared/contracts/rehearsal';
import { ClinicHttp } from './clinic-http';

/** The pretend phones and mailboxes, and the clock that can be moved. Each write is followed by the state after it. */
@Injectable({ providedIn: 'root' })
export class RehearsalClient {
  private readonly http = inject(ClinicHttp);

  state(): Promise<RehearsalState> {
    return this.http.get('/rehearsal', rehearsalState);
  }

  moveClock(request: MoveClockRequest): Promise<RehearsalState> {
    return this.afterwards(this.http.post('/rehearsal/clock', request, done));
  }

  reply(request: RehearsalReplyRequest): Promise<RehearsalState> {
    return this.afterwards(this.http.post('/rehearsal/replies', request, done));
  }

  private async afterwards(write: Promise<unknown>): Promise<RehearsalState> {
    await write;
    return this.state();
  }
}
