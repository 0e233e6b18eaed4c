import { Injectable, inject } from '@angular/core';
import type {
  FamilyCalendar,
  FastingCheckRequest,
  MorningChangeRequest,
  MorningOutcome,
  MorningQuestion,
  NextMorning,
} from '../../../../shared/contracts/family-morning';
import { FamilyHttp } from './family-http';

@Injectable({ providedIn: 'root' })
export class MorningClient {
  private readonly http = inject(FamilyHttp);

  readonly calendarFile = '/api/family/calendar.ics';

  nextMorning(): Promise<NextMorning> {
    return this.http.get('next-morning');
  }

  question(): Promise<MorningQuestion> {
    return this.http.get('morning-question');
  }

  /** Safe to send twice: the submission key makes the second one an answer like the first. */
  answer(request: FastingCheckRequest): Promise<MorningOutcome> {
    return this.http.post('fasting-checks', request);
  }

  /** Safe to send twice, like `answer`. */
  change(request: MorningChangeRequest): Promise<MorningOutcome> {
    return this.http.post('morning-changes', request);
  }

  calendar(): Promise<FamilyCalendar> {
    return this.http.get('calendar');
  }
}
