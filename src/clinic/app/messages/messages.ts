import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { Router } from '@angular/router';
import { debounceTime, filter } from 'rxjs';
import { isLanguageId, languageOf } from '../../../../shared/languages/languages';
import { HouseClient } from '../../../common/api/clinic/house-client';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { PhonePipe } from '../../../common/ui/phone-words';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';

/** What goes out to whom, in which exact words, and how far it has come. */
@Component({
  selector: 'td-messages',
  imports: [SheetStates, MomentPipe, PhonePipe],
  templateUrl: './messages.html',
  styleUrl: './messages.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Messages {
  private readonly client = inject(HouseClient);
  private readonly router = inject(Router);

  /** 'waiting', 'sent', 'failed' or nothing for all; from the address. */
  readonly show = input<string>();
  protected readonly zone = inject(ClinicUser).zone;
  protected readonly loaded = new Loaded(() => this.client.messages());
  protected readonly health = computed(() => this.loaded.value()?.health ?? null);
  protected readonly chosen = computed(() => this.show() ?? 'all');
  protected readonly messages = computed(() => {
    const states = groups[this.chosen()];
    const all = this.loaded.value()?.messages ?? [];
    return states === undefined ? all : all.filter((one) => states.includes(one.state));
  });
  protected readonly choices = [
    { show: 'all', says: $localize`:@@clinic.messages.all:All` },
    { show: 'waiting', says: $localize`:@@clinic.messages.waiting:Waiting` },
    { show: 'sent', says: $localize`:@@clinic.messages.sent:Sent` },
    { show: 'failed', says: $localize`:@@clinic.messages.failed:Not sent` },
  ];

  constructor() {
    void this.loaded.again();
    inject(LiveClient)
      .news.pipe(
        filter((news) => ['messages', 'opened'].includes(news.topic)),
        debounceTime(300),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }

  protected choose(show: string): void {
    void this.router.navigate([], { queryParams: { show: show === 'all' ? null : show } });
  }

  /** A text may begin with the clinic's name in other letters: its direction is that of its language. */
  protected dirOf(language: string): 'ltr' | 'rtl' {
    return isLanguageId(language) ? languageOf(language).dir : 'ltr';
  }

  protected isTrouble(state: string): boolean {
    return state === 'failed' || state === 'given-up';
  }
}

const groups: Record<string, readonly string[] | undefined> = {
  waiting: ['queued', 'sending'],
  sent: ['sent', 'delivered'],
  failed: ['failed', 'given-up', 'withdrawn'],
};
