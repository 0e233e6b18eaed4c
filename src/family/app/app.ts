import { ChangeDetectionStrategy, Component, DOCUMENT, effect, inject } from '@angular/core';
import { RouterOutlet } from '@angular/router';
import { FamilyAnswers } from '../../common/session/family-answers';
import { FamilyVisit } from '../../common/session/family-visit';
import { LiveRegion } from '../../common/ui/states/announcer';
import { ReachBar } from './reach-bar';

@Component({
  selector: 'td-family',
  imports: [LiveRegion, ReachBar, RouterOutlet],
  template: `<a class="skip" href="#title" (click)="toHeading($event)" i18n="@@family.skip"
      >Go to the page</a
    >
    <main><router-outlet /></main>
    <td-live-region />
    @if (visit.clinic(); as clinic) {
      <td-reach-bar [clinic]="clinic" />
    }`,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class App {
  protected readonly visit = inject(FamilyVisit);
  private readonly document = inject(DOCUMENT);

  constructor() {
    const answers = inject(FamilyAnswers);
    // Answers left from an earlier visit go out as soon as somebody is signed in.
    effect(() => {
      if (this.visit.session() !== null) void answers.start();
    });
  }

  /** A plain fragment link would leave the page, because addresses are read against the base of the language. */
  protected toHeading(event: Event): void {
    event.preventDefault();
    this.document.getElementById('title')?.focus();
  }
}
