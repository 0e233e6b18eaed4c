import { Injectable, inject } from '@angular/core';
import {
  closing,
  type CloseMorningRequest,
  type Closing,
} from '../../../../shared/contracts/closing';
import { ClinicHttp } from './clinic-http';

/** A morning that the clinic does not hold. */
@Injectable({ providedIn: 'root' })
export class ClosingClient {
  private readonly http = inject(ClinicHttp);

  look(on: string): Promise<Closing> {
    return this.http.get(`/closings/${on}`, closing);
  }

  close(on: string, request: CloseMorningRequest): Promise<Closing> {
    return this.http.post(`/closings/${on}`, request, closing);
  }
}
