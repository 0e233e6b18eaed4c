import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
} from '@angular/core';
import { Router } from '@angular/router';
import { isLanguageId, languageOf } from '../../../../shared/languages/languages';
import { HouseClient } from '../../../common/api/clinic/house-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { LanguageNamePipe } from '../../../common/ui/language-name';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { StateMark } from '../../../common/ui/state-mark/state-mark';

const pageLength = 40;
const languageName = new LanguageNamePipe();

/** Every text that leaves the clinic, by version: who wrote it, who signed it off. */
@Component({
  selector: 'td-wording',
  imports: [SheetStates, StateMark, MomentPipe],
  templateUrl: './wording.html',
  styleUrl: './wording.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WordingScreen {
  private readonly client = inject(HouseClient);
  private readonly router = inject(Router);

  /** Words to look for, from the address. */
  readonly find = input<string>();
  protected readonly zone = inject(ClinicUser).zone;
  protected readonly loaded = new Loaded(() => this.client.wordings());
  protected readonly wordings = computed(() => {
    const all = this.loaded.value()?.wordings ?? [];
    const words = (this.find() ?? '').trim().toLowerCase();
    if (words === '') return all;
    return all.filter((one) => `${one.messageKey} ${one.body}`.toLowerCase().includes(words));
  });
  /** Hundreds of texts in a dozen languages: so many are shown at a time. */
  protected readonly shownCount = linkedSignal({
    source: () => this.find(),
    computation: () => pageLength,
  });
  protected readonly shown = computed(() => this.wordings().slice(0, this.shownCount()));
  protected readonly unsigned = computed(
    () => (this.loaded.value()?.wordings ?? []).filter((one) => !one.isSignedOff).length,
  );

  constructor() {
    void this.loaded.again();
  }

  /** A text may begin with a name in other letters: its direction is that of its language. */
  protected dirOf(language: string): 'ltr' | 'rtl' {
    return isLanguageId(language) ? languageOf(language).dir : 'ltr';
  }

  protected nameOf(language: string): string {
    return isLanguageId(language) ? languageName.transform(languageOf(language)) : language;
  }

  protected showMore(): void {
    this.shownCount.update((count) => count + pageLength);
  }

  protected look(event: Event, words: string): void {
    event.preventDefault();
    void this.router.navigate([], { queryParams: { find: words === '' ? null : words } });
  }
}
