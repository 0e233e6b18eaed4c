import { Injectable, inject } from '@angular/core';
import {
  morningChanged,
  type BeginCollectionRequest,
  type DoorCheckRequest,
  type EndCollectionRequest,
  type FeedRequest,
  type MorningChanged,
  thisMorning,
  type ThisMorning,
} from '../../../../shared/contracts/this-morning';
import { ClinicHttp } from './clinic-http';

/** The morning's list and what is done on it. */
@Injectable({ providedIn: 'root' })
export class MorningBoardClient {
  private readonly http = inject(ClinicHttp);

  day(on: string | null): Promise<ThisMorning> {
    return this.http.get(on === null ? '/this-morning' : `/this-morning?on=${on}`, thisMorning);
  }

  arrive(morningId: number, version: number): Promise<MorningChanged> {
    return this.http.post(`/mornings/${morningId}/arrival`, { version }, morningChanged);
  }

  checkAtDoor(morningId: number, request: DoorCheckRequest): Promise<MorningChanged> {
    return this.http.post(`/mornings/${morningId}/door-checks`, request, morningChanged);
  }

  begin(morningId: number, request: BeginCollectionRequest): Promise<MorningChanged> {
    return this.http.post(`/mornings/${morningId}/collection`, request, morningChanged);
  }

  end(morningId: number, request: EndCollectionRequest): Promise<MorningChanged> {
    return this.http.put(`/mornings/${morningId}/collection`, request, morningChanged);
  }

  feed(morningId: number, request: FeedRequest): Promise<MorningChanged> {
    return this.http.post(`/mornings/${morningId}/feeding`, request, morningChanged);
  }
}
