import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { ReactiveFormsModule } from '@angular/forms';
import { MatCheckboxModule } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { RouterLink } from '@angular/router';
import { saveOnCallRequest } from '../../../../../shared/contracts/alerts';
import { clinicLanguages } from '../../../../../shared/languages/clinic-languages';
import { languageOf } from '../../../../../shared/languages/languages';
import { AlertsClient } from '../../../../common/api/clinic/alerts-client';
import { clinicFailure } from '../../../../common/api/clinic/clinic-http';
import { ClinicClock } from '../../../../common/session/clinic-clock';
import { ClinicUser } from '../../../../common/session/clinic-user';
import { faultOf, issuesByPath, showFaults } from '../../../../common/ui/form/form-faults';
import { formFieldLook } from '../../../../common/ui/form/form-field-look';
import { Loaded } from '../../../../common/ui/loaded';
import { SheetStates } from '../../../../common/ui/sheet-states/sheet-states';
import { weekdayWords } from '../weekday-words';
import {
  newTurn,
  onCallGroup,
  onCallRequest,
  type OnCallGroup,
  type TurnGroup,
} from './on-call-form';

/** Who is told what cannot wait: turns, deputies, and how each one is reached. */
@Component({
  selector: 'td-on-call',
  imports: [
    MatCheckboxModule,
    MatFormFieldModule,
    MatInputModule,
    MatSelectModule,
    ReactiveFormsModule,
    RouterLink,
    SheetStates,
  ],
  templateUrl: './on-call.html',
  styleUrls: ['../../../../common/ui/form/fields.scss', '../part.scss', './on-call.scss'],
  providers: [formFieldLook],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class OnCall {
  private readonly client = inject(AlertsClient);
  private readonly clock = inject(ClinicClock);
  private readonly user = inject(ClinicUser);

  /** From the address; the own site when there is none. */
  readonly site = input<string>();

  private readonly siteId = computed(() => Number(this.site()) || null);
  protected readonly loaded = new Loaded(() => this.client.onCall(this.siteId()));
  protected readonly list = this.loaded.value;
  protected readonly mayWrite = computed(() => this.user.has('set-up.write'));
  protected readonly weekdays = weekdayWords;
  protected readonly languages = clinicLanguages.map((id) => {
    const { tag, nativeName } = languageOf(id);
    return { id, tag, name: nativeName };
  });
  protected readonly faultOf = faultOf;
  protected readonly group = signal<OnCallGroup | null>(null);
  /** Staff ids on the list, for the part that says how each is reached. */
  protected readonly listed = signal<ReadonlySet<number>>(new Set());
  protected readonly isBusy = signal(false);
  protected readonly isKept = signal(false);
  protected readonly says = signal<readonly string[]>([]);

  constructor() {
    effect(() => {
      this.siteId();
      untracked(() => void this.loaded.again());
    });
    effect(() => {
      const list = this.list();
      if (list === null) return;
      const group = onCallGroup(list);
      if (!this.mayWrite()) group.disable();
      this.group.set(group);
      untracked(() => this.follow());
    });
  }

  protected nameOf(staffId: number): string {
    return this.list()?.staff.find(({ id }) => id === staffId)?.fullName ?? '';
  }

  protected mailOf(staffId: number): string {
    return this.list()?.staff.find(({ id }) => id === staffId)?.email ?? '';
  }

  protected turnDay(turn: TurnGroup, weekday: number): void {
    const days = turn.controls.weekdays;
    days.setValue(
      days.value.includes(weekday)
        ? days.value.filter((day) => day !== weekday)
        : [...days.value, weekday],
    );
  }

  protected add(): void {
    const today = new Intl.DateTimeFormat('en-CA', { timeZone: this.list()?.site.zone }).format(
      this.clock.now(),
    );
    this.group()?.controls.turns.push(newTurn(today));
    this.follow();
  }

  protected remove(index: number): void {
    this.group()?.controls.turns.removeAt(index);
    this.follow();
  }

  protected follow(): void {
    const turns = this.group()?.getRawValue().turns ?? [];
    this.listed.set(
      new Set(
        turns.flatMap(({ staffId, deputyId }) =>
          [staffId, deputyId].filter((id): id is number => id !== null),
        ),
      ),
    );
  }

  protected async save(): Promise<void> {
    const list = this.list();
    const group = this.group();
    if (list === null || group === null || this.isBusy()) return;
    this.says.set([]);
    this.isKept.set(false);
    const parsed = saveOnCallRequest.safeParse(onCallRequest(group, list.version));
    if (!parsed.success) {
      this.says.set(showFaults(group, this.ofForm(issuesByPath(parsed.error.issues))));
      return;
    }
    this.isBusy.set(true);
    try {
      this.loaded.show(await this.client.saveOnCall(list.site.id, parsed.data));
      this.isKept.set(true);
    } catch (error) {
      const failure = clinicFailure(error);
      const rest = showFaults(group, this.ofForm(failure.fields));
      this.says.set(failure.fields.size > 0 ? rest : [failure.message]);
    } finally {
      this.isBusy.set(false);
    }
  }

  /** The request holds those alone who stand on the list; the form holds everybody. */
  private ofForm(faults: ReadonlyMap<string, string>): Map<string, string> {
    const places = (this.group()?.controls.reach.controls ?? [])
      .map((person, index) => ({ index, id: person.controls.staffId.value }))
      .filter(({ id }) => this.listed().has(id));
    return new Map(
      [...faults].map(([path, says]) => [
        path.replace(
          /^reach\.(\d+)/,
          (_, at: string) => `reach.${places[Number(at)]?.index ?? at}`,
        ),
        says,
      ]),
    );
  }
}
