import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { languages } from '../../../../shared/languages/languages';
import { FamilyVisit } from '../../../common/session/family-visit';
import { PageHeading } from '../../../common/ui/page-heading/page-heading';
import { PictureMark } from '../../../common/ui/picture/picture-mark';
import { SkyBand } from '../../../common/ui/sky-band/sky-band';

/** How to get an interpreter: call, and say one English sentence that can also be shown. */
@Component({
  selector: 'td-ask-interpreter',
  imports: [PageHeading, PictureMark, RouterLink, SkyBand],
  templateUrl: './ask-interpreter.html',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AskInterpreter {
  private readonly visit = inject(FamilyVisit);
  protected readonly clinic = this.visit.clinic;
  /** In English on purpose: it is for the person at the clinic. */
  protected readonly language = computed(
    () => languages.find(({ id }) => id === this.visit.session()?.language)?.englishName ?? '',
  );

  constructor() {
    // Opened directly: whoever is signed in, or was, gets the number; everybody else reads where it stands.
    if (this.visit.session() === null) void this.visit.load().catch(() => null);
  }
}
