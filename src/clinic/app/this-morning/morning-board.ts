import { DestroyRef, Injectable, computed, inject, signal } from '@angular/core';
import { auditTime, filter } from 'rxjs';
import type {
  DoorCheckRequest,
  EndCollectionRequest,
  FeedRequest,
  MorningChanged,
  MorningRow,
  ThisMorning,
} from '../../../../shared/contracts/this-morning';
import { dayOf } from '../../../../shared/domain/zone';
import { clinicFailure, type ClinicFailure } from '../../../common/api/clinic/clinic-http';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { MorningBoardClient } from '../../../common/api/clinic/morning-board-client';
import { SpecimensClient } from '../../../common/api/clinic/specimens-client';
import { ClinicClock } from '../../../common/session/clinic-clock';
import { ClinicUser } from '../../../common/session/clinic-user';
import { Loaded } from '../../../common/ui/loaded';
import { changeWords } from './change-words';

/** What stands in a row after a step: warnings that block nothing, or why it was not kept. */
export interface RowNote {
  readonly isFailure: boolean;
  readonly lines: readonly string[];
  /** Sentences beside fields, by path of the request. */
  readonly fields: ReadonlyMap<string, string>;
}

export interface BoardNews {
  readonly at: string;
  readonly says: string;
}

const settleMs = 300;
/** The server's words count minutes, so that they are fetched again even when nothing happens. */
const refreshMs = 30_000;

/** The sheet of one day: fetched, kept live, and changed. */
@Injectable()
export class MorningBoard {
  private readonly client = inject(MorningBoardClient);
  private readonly specimens = inject(SpecimensClient);
  private readonly clock = inject(ClinicClock);
  private readonly user = inject(ClinicUser);
  private on: string | null = null;

  readonly loaded = new Loaded<ThisMorning>(() => this.fetch());
  readonly busyId = signal<number | null>(null);
  readonly notes = signal<ReadonlyMap<number, RowNote>>(new Map());
  /** The last change that reached this screen. */
  readonly news = signal<BoardNews | null>(null);
  readonly lastAgent = signal('');
  readonly zone = computed(() => this.loaded.value()?.site.zone ?? this.user.zone());
  readonly isToday = computed(() => {
    const sheet = this.loaded.value();
    return sheet !== null && sheet.on === dayOf(this.clock.time(), this.zone());
  });

  constructor() {
    const timer = setInterval(() => void this.loaded.again(), refreshMs);
    const topics = ['mornings', 'specimens', 'clock', 'opened'];
    const live = inject(LiveClient)
      .news.pipe(
        filter(({ topic }) => topics.includes(topic)),
        auditTime(settleMs),
      )
      .subscribe(() => void this.loaded.again());
    inject(DestroyRef).onDestroy(() => {
      clearInterval(timer);
      live.unsubscribe();
    });
  }

  async open(on: string | null): Promise<void> {
    this.on = on;
    this.news.set(null);
    await this.loaded.again();
  }

  arrive(row: MorningRow): Promise<boolean> {
    return this.change(row, () => this.client.arrive(row.morningId, row.version));
  }

  checkAtDoor(row: MorningRow, request: DoorCheckRequest): Promise<boolean> {
    return this.change(row, () => this.client.checkAtDoor(row.morningId, request));
  }

  /** Past the longest fast a clinician's reason goes with it. */
  begin(row: MorningRow, roomId: number, ceilingReason: string | null = null): Promise<boolean> {
    const request = { version: row.version, roomId, ceilingReason };
    return this.change(row, () => this.client.begin(row.morningId, request));
  }

  end(row: MorningRow, request: EndCollectionRequest): Promise<boolean> {
    if (request.outcome === 'collected' && request.neutralisedWith)
      this.lastAgent.set(request.neutralisedWith);
    return this.change(row, () => this.client.end(row.morningId, request));
  }

  feed(row: MorningRow, event: FeedRequest['event']): Promise<boolean> {
    return this.change(row, () => this.client.feed(row.morningId, { version: row.version, event }));
  }

  neutralise(row: MorningRow, agent: string): Promise<boolean> {
    this.lastAgent.set(agent);
    const step = { step: 'neutralised', at: this.clock.instant(), with: agent } as const;
    return this.changeSpecimen(row, step);
  }

  label(row: MorningRow, label: string): Promise<boolean> {
    return this.changeSpecimen(row, { step: 'labelled', label });
  }

  forgetNote(morningId: number): void {
    this.notes.update((notes) => new Map([...notes].filter(([id]) => id !== morningId)));
  }

  private changeSpecimen(
    row: MorningRow,
    step:
      | { readonly step: 'neutralised'; readonly at: string; readonly with: string }
      | { readonly step: 'labelled'; readonly label: string },
  ): Promise<boolean> {
    const { specimen } = row;
    if (specimen === null) return Promise.resolve(false);
    return this.change(row, async () => {
      const request = { ...step, version: specimen.version };
      const { warnings } = await this.specimens.step(specimen.id, request);
      await this.loaded.again();
      return { row: this.rowOf(row.morningId) ?? row, warnings };
    });
  }

  /** One change at a time; on failure the row is fetched again and what was typed stays where it is. */
  private async change(row: MorningRow, send: () => Promise<MorningChanged>): Promise<boolean> {
    if (this.busyId() !== null) return false;
    this.busyId.set(row.morningId);
    try {
      const changed = await send();
      this.take(changed.row);
      this.note(row.morningId, { isFailure: false, lines: changed.warnings, fields: new Map() });
      void this.loaded.again();
      return true;
    } catch (error) {
      await this.explain(row, clinicFailure(error));
      return false;
    } finally {
      this.busyId.set(null);
    }
  }

  private async explain(row: MorningRow, failure: ClinicFailure): Promise<void> {
    const { fields } = failure;
    if (failure.status !== 409) {
      const lines = [failure.message, ...(failure.problem?.detail ? [failure.problem.detail] : [])];
      this.note(row.morningId, { isFailure: true, lines, fields });
      return;
    }
    await this.loaded.again();
    const after = this.rowOf(row.morningId);
    const what = after ? changeWords(row, after, this.zone()) : null;
    const kept = $localize`:@@clinic.this-morning.look-again:Nothing that you typed is lost. Look at the row as it is now and send again.`;
    const lines =
      failure.code === 'changed-meanwhile'
        ? [
            $localize`:@@clinic.this-morning.changed-meanwhile:Somebody was quicker.`,
            ...(what === null ? [] : [what]),
            kept,
          ]
        : [failure.message, ...(what === null ? [] : [what])];
    this.note(row.morningId, { isFailure: true, lines, fields });
  }

  private note(morningId: number, note: RowNote): void {
    this.notes.update((notes) => new Map(notes).set(morningId, note));
  }

  private rowOf(morningId: number): MorningRow | undefined {
    return this.loaded.value()?.rows.find((row) => row.morningId === morningId);
  }

  private take(row: MorningRow): void {
    const sheet = this.loaded.value();
    if (sheet === null) return;
    const rows = sheet.rows.map((one) => (one.morningId === row.morningId ? row : one));
    this.tell(sheet.rows, rows);
    this.loaded.show({ ...sheet, rows });
  }

  private async fetch(): Promise<ThisMorning> {
    const on = this.on;
    const sheet = await this.client.day(on);
    this.clock.follow(sheet.now);
    const before = this.loaded.value();
    if (before?.on === sheet.on) this.tell(before.rows, sheet.rows);
    return sheet;
  }

  private tell(before: readonly MorningRow[], after: readonly MorningRow[]): void {
    const says = after.flatMap((row) => {
      const old = before.find(({ morningId }) => morningId === row.morningId);
      const change = old ? changeWords(old, row, this.zone()) : null;
      return change === null ? [] : [change];
    });
    if (says.length > 0) this.news.set({ at: this.clock.instant(), says: says.join(' ') });
  }
}
