import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  untracked,
} from '@angular/core';
import { Router, RouterLink } from '@angular/router';
import { languages } from '../../../../shared/languages/languages';
import { SetUpClient } from '../../../common/api/clinic/set-up-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { DayPipe, MomentPipe } from '../../../common/ui/clinic-times';
import { LanguageNamePipe } from '../../../common/ui/language-name';
import { Loaded } from '../../../common/ui/loaded';
import { PhonePipe } from '../../../common/ui/phone-words';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { weekdaysSay } from './weekday-words';

/** How many of the coming holidays stand on the first page. */
const holidaysShown = 4;

/** One site as it is set up: place, rooms, calendar, fasting protocols and laboratory profiles with who signed them. */
@Component({
  selector: 'td-set-up',
  imports: [PhonePipe, RouterLink, SheetStates, DayPipe, MomentPipe],
  templateUrl: './set-up.html',
  styleUrl: './set-up.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SetUpScreen {
  private readonly client = inject(SetUpClient);
  private readonly router = inject(Router);
  private readonly user = inject(ClinicUser);
  private readonly languageName = new LanguageNamePipe();

  /** From the address; the own site when there is none. */
  readonly site = input<string>();
  readonly kept = input<string>();

  private readonly siteId = computed(() => Number(this.site()) || null);
  protected readonly loaded = new Loaded(() => this.client.read(this.siteId()));
  protected readonly setUp = this.loaded.value;
  protected readonly zone = computed(() => this.setUp()?.site.zone ?? this.user.zone());
  protected readonly maySeePeople = computed(() => this.user.has('people.read'));
  protected readonly maySeeAccess = computed(() => this.user.has('access-record.read'));
  protected readonly mayWrite = computed(() => this.user.has('set-up.write'));
  protected readonly wasKept = computed(() => this.kept() === 'site');
  protected readonly days = computed(() => weekdaysSay(this.setUp()?.site.clinicWeekdays ?? []));
  protected readonly dawnLanguages = computed(() => {
    const spoken = this.setUp()?.site.dawnLanguages ?? [];
    return languages
      .filter(({ id }) => spoken.includes(id))
      .map((language) => this.languageName.transform(language))
      .join(', ');
  });
  protected readonly roomsInUse = computed(() =>
    (this.setUp()?.rooms ?? []).filter(({ isInUse }) => isInUse),
  );
  protected readonly nextHolidays = computed(() =>
    (this.setUp()?.holidays ?? []).slice(0, holidaysShown),
  );

  constructor() {
    effect(() => {
      this.siteId();
      untracked(() => void this.loaded.again());
    });
  }

  protected choose(siteId: string): void {
    void this.router.navigate([], { queryParams: { site: siteId } });
  }
}
