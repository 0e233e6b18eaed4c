import {
  ChangeDetectionStrategy,
  Component,
  DOCUMENT,
  computed,
  effect,
  inject,
  input,
  viewChildren,
} from '@angular/core';
import { RouterLink } from '@angular/router';
import type { MorningRow } from '../../../../shared/contracts/this-morning';
import { isDay } from '../../../../shared/domain/day';
import { dayOf } from '../../../../shared/domain/zone';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { ClockPipe, DayPipe, clockIn, longDay } from '../../../common/ui/clinic-times';
import { RoomLane } from '../../../common/ui/room-lane/room-lane';
import { Ruler } from '../../../common/ui/ruler/ruler';
import { isOnRuler, minuteOn, rulerOf } from '../../../common/ui/ruler/ruler-scale';
import { RulerSky } from '../../../common/ui/ruler/ruler-sky';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { StateMark } from '../../../common/ui/state-mark/state-mark';
import { ChildRow } from './child-row';
import { MorningBoard } from './morning-board';
import { nextStep, roomsNow, type NextStep, type Surroundings } from './next-step';
import { roomLines } from './rooms-of-morning';

/** The sheet of a morning: one row a child in order of arrival, which never moves; live. */
@Component({
  selector: 'td-this-morning',
  imports: [
    ChildRow,
    ClockPipe,
    DayPipe,
    RoomLane,
    RouterLink,
    Ruler,
    RulerSky,
    SheetStates,
    StateMark,
  ],
  providers: [MorningBoard],
  templateUrl: './this-morning.html',
  styleUrl: './this-morning.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ThisMorning {
  private readonly clock = inject(ClinicClock);
  private readonly user = inject(ClinicUser);
  private readonly window = inject(DOCUMENT).defaultView;
  protected readonly board = inject(MorningBoard);

  /** A calendar day from the address; today when there is none. */
  readonly on = input<string>();

  private readonly rows = viewChildren(ChildRow);
  protected readonly zone = this.board.zone;
  protected readonly now = this.clock.time;
  protected readonly sheet = this.board.loaded.value;
  protected readonly time = computed(() =>
    clockIn(new Date(this.now()).toISOString(), this.zone()),
  );
  protected readonly scale = computed(() => {
    const sheet = this.sheet();
    return sheet === null ? null : rulerOf(sheet.on, sheet.site.zone);
  });
  /** 'Tuesday, April 6' */
  protected readonly heading = computed(() => {
    const on = this.sheet()?.on;
    return on === undefined ? '' : longDay(on);
  });
  /** Minutes on the ruler; null when now lies on another day. */
  protected readonly nowMinute = computed(() => {
    const scale = this.scale();
    return scale !== null && isOnRuler(scale, this.now()) ? minuteOn(scale, this.now()) : null;
  });
  protected readonly rooms = computed(() => {
    const [sheet, scale] = [this.sheet(), this.scale()];
    return sheet === null || scale === null ? [] : roomLines(sheet, scale, this.now());
  });
  protected readonly children = computed(() => {
    const sheet = this.sheet();
    if (sheet === null) return [];
    const around: Surroundings = {
      now: this.now(),
      zone: this.zone(),
      rooms: roomsNow(sheet),
      suggestion: sheet.suggestion,
      has: (right) => this.user.has(right),
    };
    return sheet.rows.map((row) => ({ row, step: this.stepOf(row, around) }));
  });
  /** "Next: Samira, Room 2." in front of its reason. */
  protected readonly next = computed(() => {
    const suggestion = this.sheet()?.suggestion;
    if (!suggestion) return null;
    const end = suggestion.says.indexOf('. ');
    const cut = end < 0 ? suggestion.says.length : end + 1;
    return {
      morningId: suggestion.morningId,
      whom: suggestion.says.slice(0, cut),
      why: suggestion.says.slice(cut),
    };
  });
  /** The day that can be closed from here; null for one that is past. */
  protected readonly closable = computed(() => {
    const on = this.sheet()?.on;
    if (on === undefined || !this.user.has('mornings.close')) return null;
    return on < dayOf(this.now(), this.zone()) ? null : on;
  });
  protected readonly days = computed(() => {
    const sheet = this.sheet();
    if (sheet === null) return { before: null, after: null };
    return {
      before: sheet.otherDays.filter((day) => day < sheet.on).at(-1) ?? null,
      after: sheet.otherDays.find((day) => day > sheet.on) ?? null,
    };
  });

  constructor() {
    effect(() => {
      const on = this.on();
      void this.board.open(on !== undefined && isDay(on) ? on : null);
    });
  }

  protected showNext(): void {
    const next = this.next();
    this.rows()
      .find((row) => row.row().morningId === next?.morningId)
      ?.show();
  }

  protected print(): void {
    this.window?.print();
  }

  /** Steps belong to their own day; other days are for reading. */
  private stepOf(row: MorningRow, around: Surroundings): NextStep {
    if (this.board.isToday()) return nextStep(row, around);
    return { says: '', offers: [], more: [], filled: 0, isPair: false };
  }
}
