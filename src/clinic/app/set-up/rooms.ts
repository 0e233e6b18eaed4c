import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  untracked,
} from '@angular/core';
import { RouterLink } from '@angular/router';
import { SetUpClient } from '../../../common/api/clinic/set-up-client';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { RoomForm } from './room-form';

/** The rooms of a site: with pairs of staff they are what a morning can hold. */
@Component({
  selector: 'td-rooms',
  imports: [RoomForm, RouterLink, SheetStates],
  template: `<div class="lead">
      <h1 tabindex="-1" i18n="@@clinic.rooms.heading">Rooms</h1>
      <p class="count">{{ setUp()?.site?.name }}</p>
      <p class="where" i18n="@@clinic.rooms.lead">
        A room closes after each child until its air is clean. What is planned already stays as it
        is; a change holds from the next planning on.
      </p>
    </div>
    <td-sheet-states [loaded]="loaded">
      @if (setUp(); as one) {
        @for (room of one.rooms; track room.id + '.' + room.version) {
          <section class="sheet part">
            <h2>
              {{ room.name }}
              @if (!room.isInUse) {
                <span class="told" i18n="@@clinic.rooms.unused">not in use</span>
              }
            </h2>
            <td-room-form [siteId]="one.site.id" [room]="room" (kept)="loaded.show($event)" />
          </section>
        }
        <section class="sheet part" aria-labelledby="new">
          <h2 id="new" i18n="@@clinic.rooms.new">Another room</h2>
          <td-room-form [siteId]="one.site.id" (kept)="loaded.show($event)" />
        </section>
      }
    </td-sheet-states>
    <a
      class="do"
      routerLink="/set-up"
      [queryParams]="{ site: site() ?? null }"
      i18n="@@clinic.set-up.back"
      >Back to set-up</a
    >`,
  styleUrl: './part.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Rooms {
  private readonly client = inject(SetUpClient);

  /** From the address; the own site when there is none. */
  readonly site = input<string>();

  private readonly siteId = computed(() => Number(this.site()) || null);
  protected readonly loaded = new Loaded(() => this.client.read(this.siteId()));
  protected readonly setUp = this.loaded.value;

  constructor() {
    effect(() => {
      this.siteId();
      untracked(() => void this.loaded.again());
    });
  }
}
