import { Injectable, inject } from '@angular/core';
import {
  setOut,
  supplyList,
  type SetOut,
  type SetOutTickRequest,
  type SupplyList,
  type SupplyListRequest,
} from '../../../../shared/contracts/supplies';
import { ClinicHttp } from './clinic-http';

@Injectable({ providedIn: 'root' })
export class SetOutClient {
  private readonly http = inject(ClinicHttp);

  read(on?: string): Promise<SetOut> {
    return this.http.get(`/set-out${on ? `?on=${on}` : ''}`, setOut);
  }

  tick(on: string, request: SetOutTickRequest): Promise<SetOut> {
    return this.http.post(`/set-out/${on}/ticks`, request, setOut);
  }

  list(): Promise<SupplyList> {
    return this.http.get('/supply-list', supplyList);
  }

  keepList(request: SupplyListRequest): Promise<SupplyList> {
    return this.http.put('/supply-list', request, supplyList);
  }
}
