import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { FamilyCalendar } from '../../../../shared/contracts/family-morning';
import { type FamilyFailure, familyFailure } from '../../../common/api/family/family-failure';
import { MorningClient } from '../../../common/api/family/morning-client';
import { FamilyVisit } from '../../../common/session/family-visit';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { SkyBand } from '../../../common/ui/sky-band/sky-band';
import { PageSkeleton } from '../../../common/ui/states/page-skeleton';
import { PageTrouble } from '../../../common/ui/states/page-trouble';
import { FollowCalendar } from './follow-calendar';

/** The planned mornings, and a file of neutral entries for the phone's own calendar. */
@Component({
  selector: 'td-family-calendar',
  imports: [
    FollowCalendar,
    PageHeading,
    PageSkeleton,
    PageTrouble,
    PictureMark,
    RouterLink,
    SkyBand,
  ],
  templateUrl: './family-calendar.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FamilyCalendarPage {
  private readonly client = inject(MorningClient);
  protected readonly clinic = inject(FamilyVisit).clinic;
  protected readonly file = this.client.calendarFile;
  protected readonly calendar = signal<FamilyCalendar | null>(null);
  protected readonly failure = signal<FamilyFailure | null>(null);

  constructor() {
    void this.load();
  }

  protected async load(): Promise<void> {
    this.failure.set(null);
    try {
      this.calendar.set(await this.client.calendar());
    } catch (error) {
      this.failure.set(familyFailure(error));
    }
  }
}
