import { Injectable, inject } from '@angular/core';
import {
  placesOfCountry,
  setUp,
  type AddRoomRequest,
  type AddSiteRequest,
  type CloseDaysRequest,
  type HolidayRequest,
  type OpenDaysRequest,
  type PlacesOfCountry,
  type SaveRoomRequest,
  type SaveSiteRequest,
  type SetUp,
} from '../../../../shared/contracts/set-up';
import { ClinicHttp } from './clinic-http';

/** Sites, rooms and calendar. Every change answers with the set-up of its site as it is then. */
@Injectable({ providedIn: 'root' })
export class SetUpClient {
  private readonly http = inject(ClinicHttp);

  /** @param siteId the own site when null */
  read(siteId: number | null): Promise<SetUp> {
    return this.http.get(siteId === null ? '/set-up' : `/set-up?siteId=${siteId}`, setUp);
  }

  places(country: string): Promise<PlacesOfCountry> {
    return this.http.get(`/set-up/places?country=${country}`, placesOfCountry);
  }

  addSite(request: AddSiteRequest): Promise<SetUp> {
    return this.http.post('/set-up/sites', request, setUp);
  }

  saveSite(siteId: number, request: SaveSiteRequest): Promise<SetUp> {
    return this.http.put(`/set-up/sites/${siteId}`, request, setUp);
  }

  addRoom(request: AddRoomRequest): Promise<SetUp> {
    return this.http.post('/set-up/rooms', request, setUp);
  }

  saveRoom(roomId: number, request: SaveRoomRequest): Promise<SetUp> {
    return this.http.put(`/set-up/rooms/${roomId}`, request, setUp);
  }

  closeDays(request: CloseDaysRequest): Promise<SetUp> {
    return this.http.post('/set-up/closures', request, setUp);
  }

  openDays(request: OpenDaysRequest): Promise<SetUp> {
    return this.http.post('/set-up/closures/end', request, setUp);
  }

  setHoliday(request: HolidayRequest): Promise<SetUp> {
    return this.http.put('/set-up/holidays', request, setUp);
  }
}
