import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  computed,
  inject,
  input,
  signal,
} from '@angular/core';
import { NgTemplateOutlet } from '@angular/common';
import { RouterLink } from '@angular/router';
import type {
  DoorCheckRequest,
  EndCollectionRequest,
  MorningRow,
} from '../../../../shared/contracts/this-morning';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { ClockPipe } from '../../../common/ui/clinic-times';
import { HoursFastedBar } from '../../../common/ui/hours-fasted-bar/hours-fasted-bar';
import type { RulerScale } from '../../../common/ui/ruler/ruler-scale';
import { StateMark } from '../../../common/ui/state-mark/state-mark';
import { LineSuns } from '../../../common/ui/suns/line-suns';
import { CollectionForm } from './collection-form';
import { DoorCheckForm } from './door-check-form';
import { MorningBoard } from './morning-board';
import type { NextStep, Offer } from './next-step';
import { RowActs } from './row-acts';
import {
  arrivalWords,
  barWords,
  fastedWords,
  minutesLate,
  stopWords,
  verdictWords,
} from './row-words';
import { ShortForm, type ShortAsk } from './short-form';

type OpenForm = 'door-check' | 'collected' | ShortAsk;

/** So many answers of a family stand in its row; those before are folded. */
const shownAnswers = 2;

/** One row, one child: where it is, what the family said, how the fast stands, and the next step. */
@Component({
  // eslint-disable-next-line @angular-eslint/component-selector -- a list item stays a list item
  selector: 'li[tdChildRow]',
  imports: [
    ClockPipe,
    CollectionForm,
    DoorCheckForm,
    HoursFastedBar,
    LineSuns,
    NgTemplateOutlet,
    RouterLink,
    RowActs,
    ShortForm,
    StateMark,
  ],
  templateUrl: './child-row.html',
  styleUrl: './child-row.scss',
  host: {
    class: 'row cols',
    '[class.is-next]': 'isNext()',
    '[class.is-done]': 'isDone()',
    '[class.has-care]': 'hasCare()',
  },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChildRow {
  private readonly element = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly clock = inject(ClinicClock);
  private readonly user = inject(ClinicUser);
  protected readonly board = inject(MorningBoard);

  readonly row = input.required<MorningRow>();
  readonly step = input.required<NextStep>();
  readonly scale = input.required<RulerScale>();
  readonly zone = input.required<string>();
  /** The suggestion is a frame and a tab; the row keeps its place. */
  readonly isNext = input(false);

  protected readonly opened = signal<{
    form: OpenForm;
    version: number;
    roomId: number;
  } | null>(null);
  protected readonly now = this.clock.time;
  protected readonly arrival = computed(() => arrivalWords(this.row(), this.now()));
  protected readonly verdict = computed(() => verdictWords(this.row(), this.now()));
  protected readonly fasted = computed(() => fastedWords(this.row(), this.now(), this.zone()));
  protected readonly barSays = computed(() => barWords(this.row(), this.zone()));
  /** What was said last decides; a family that corrects itself often must not push the others off the screen. */
  protected readonly saidLast = computed(() => this.row().said.slice(-shownAnswers));
  protected readonly saidBefore = computed(() => this.row().said.slice(0, -shownAnswers));
  /** Rule, inputs and source as lines; drawn only when somebody opens them. */
  protected readonly explains = computed(() =>
    this.row().explains.flatMap(({ says }) => (says === undefined ? [] : [says])),
  );
  protected readonly stops = computed(() => stopWords(this.row(), this.now()));
  protected readonly isLate = computed(() => minutesLate(this.row()) > 0);
  protected readonly isDone = computed(() =>
    ['collected', 'not-collected', 'lost'].includes(this.row().state),
  );
  protected readonly hasCare = computed(
    () => this.row().warnings.length + this.row().cautions.length > 0,
  );
  protected readonly note = computed(() => this.board.notes().get(this.row().morningId) ?? null);
  protected readonly fields = computed(() => this.note()?.fields ?? new Map<string, string>());
  protected readonly isBusy = computed(() => this.board.busyId() === this.row().morningId);
  protected readonly mayGoOn = computed(() => this.user.has('orders.sign'));
  protected readonly mayOpenChild = computed(() => this.user.has('children.read'));
  /** The row went on while a form stood open; the form says so before it is sent. */
  protected readonly hasMoved = computed(() => {
    const opened = this.opened();
    return opened !== null && opened.version !== this.row().version && !this.isBusy();
  });
  protected readonly shortAsk = computed<ShortAsk | null>(() => {
    const form = this.opened()?.form;
    return form === undefined || form === 'door-check' || form === 'collected' ? null : form;
  });

  /** Brings the row under the reader's eyes and its next step under the finger. */
  show(): void {
    const host = this.element.nativeElement;
    host.scrollIntoView({ block: 'center' });
    host.querySelector<HTMLElement>('.acts .do, h3 a')?.focus({ preventScroll: true });
  }

  protected async act(offer: Offer): Promise<void> {
    const row = this.row();
    switch (offer.act) {
      case 'arrive':
        await this.board.arrive(row);
        return;
      case 'begin':
        await this.board.begin(row, offer.roomId ?? row.room.id);
        return;
      case 'feed':
        await this.board.feed(row, 'fed');
        return;
      case 'left':
        await this.board.feed(row, 'left');
        return;
      case 'call':
        return;
      case 'door-check':
      case 'collected':
      case 'not-collected':
      case 'neutralise':
      case 'label':
      case 'go-on':
        this.board.forgetNote(row.morningId);
        this.opened.set({
          form: offer.act,
          version: row.version,
          roomId: offer.roomId ?? row.room.id,
        });
    }
  }

  protected async keepDoorCheck(request: DoorCheckRequest): Promise<void> {
    this.closeIf(await this.board.checkAtDoor(this.row(), request));
  }

  protected async keepCollection(request: EndCollectionRequest): Promise<void> {
    this.closeIf(await this.board.end(this.row(), request));
  }

  protected async keepShort(ask: ShortAsk, text: string): Promise<void> {
    const row = this.row();
    const { version } = row;
    const roomId = this.opened()?.roomId ?? row.room.id;
    const isKept =
      ask === 'go-on'
        ? await this.board.begin(row, roomId, text)
        : ask === 'not-collected'
          ? await this.board.end(row, { version, outcome: 'not-collected', reason: text })
          : ask === 'neutralise'
            ? await this.board.neutralise(row, text)
            : await this.board.label(row, text);
    this.closeIf(isKept);
  }

  protected leave(): void {
    this.board.forgetNote(this.row().morningId);
    this.closeIf(true);
  }

  /** A form that was kept closes and gives the focus back to the row; one that was refused stays as typed. */
  private closeIf(isKept: boolean): void {
    if (!isKept) {
      this.opened.update((opened) => opened && { ...opened, version: this.row().version });
      return;
    }
    this.opened.set(null);
    setTimeout(() =>
      this.element.nativeElement.querySelector<HTMLElement>('.acts .do, h3 a')?.focus(),
    );
  }
}
