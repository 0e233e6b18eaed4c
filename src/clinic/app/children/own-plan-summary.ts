import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  untracked,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import { debounceTime, filter } from 'rxjs';
import { IndividualPlansClient } from '../../../common/api/clinic/individual-plans-client';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';

/** On the record: by which plan the child's next morning goes, and how it was reached. */
@Component({
  selector: 'td-own-plan-summary',
  imports: [RouterLink, SheetStates],
  template: `
    <td-sheet-states [loaded]="loaded">
      @if (plans(); as all) {
        @if (all.isMissing) {
          <p class="is-care verdict" i18n="@@clinic.child.plan-missing">
            No plan yet for the mornings to come: a clinician composes one.
          </p>
        }
        @for (line of all.explains; track $index) {
          <p>{{ line.says }}</p>
        } @empty {
          <p class="told" i18n="@@clinic.child.no-morning">No morning is planned.</p>
        }
        @if (inForce(); as version) {
          <p class="told">{{ version.says }}, {{ version.effectiveSays }}.</p>
        }
        @if (maySign()) {
          <a
            class="do"
            [class.first]="all.isMissing"
            [routerLink]="['/children', childId(), 'plan']"
            i18n="@@clinic.child.compose"
            >Compose a plan for this child</a
          >
        }
      }
    </td-sheet-states>
  `,
  styles: `
    p {
      margin-block-end: var(--space-2);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class OwnPlanSummary {
  private readonly client = inject(IndividualPlansClient);
  private readonly user = inject(ClinicUser);

  readonly childId = input.required<number>();
  protected readonly loaded = new Loaded(() => this.client.ofChild(this.childId()));
  protected readonly plans = this.loaded.value;
  protected readonly inForce = computed(() =>
    this.plans()?.versions.find(({ isInForce }) => isInForce),
  );
  protected readonly maySign = computed(() => this.user.has('individual-plans.sign'));

  constructor() {
    effect(() => {
      this.childId();
      untracked(() => void this.loaded.again());
    });
    inject(LiveClient)
      .news.pipe(
        filter(({ topic }) => topic === 'children' || topic === 'mornings'),
        debounceTime(500),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }
}
