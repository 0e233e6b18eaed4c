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
import { ChildrenClient } from '../../../common/api/clinic/children-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { DayPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';

/** Find a child by any part of the name, or by the record number. The search keeps its place in the address. */
@Component({
  selector: 'td-children',
  imports: [RouterLink, SheetStates, DayPipe],
  templateUrl: './children.html',
  styleUrl: './children.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Children {
  private readonly client = inject(ChildrenClient);
  private readonly router = inject(Router);
  private readonly user = inject(ClinicUser);

  readonly find = input<string>();
  protected readonly loaded = new Loaded(() => this.client.find(this.find() ?? ''));
  protected readonly children = computed(() => this.loaded.value()?.children ?? []);
  protected readonly mayAdd = computed(() => this.user.has('children.write'));

  constructor() {
    effect(() => {
      this.find();
      untracked(() => void this.loaded.again());
    });
  }

  protected look(event: Event, words: string): void {
    event.preventDefault();
    void this.router.navigate([], { queryParams: { find: words.trim() === '' ? null : words } });
  }
}
