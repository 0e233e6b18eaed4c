import { Injectable, inject } from '@angular/core';
import type { CalendarFeed } from '../../../../shared/contracts/calendar-feed';
import { FamilyHttp } from './family-http';

/** The address that the phone's own calendar follows, given and taken back by the family. */
@Injectable({ providedIn: 'root' })
export class CalendarFeedClient {
  private readonly http = inject(FamilyHttp);

  feed(): Promise<CalendarFeed> {
    return this.http.get('calendar-feed');
  }

  open(): Promise<CalendarFeed> {
    return this.http.post('calendar-feed', {});
  }

  withdraw(): Promise<CalendarFeed> {
    return this.http.post('calendar-feed/withdrawal', {});
  }
}
