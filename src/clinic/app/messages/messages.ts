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
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { Router, RouterLink } from '@angular/router';
import { debounceTime, filter } from 'rxjs';
import { isLanguageId, languageOf } from '../../../../shared/languages/languages';
import {
  messageShows,
  type MessageItem,
  type MessagesQuery,
} from '../../../../shared/contracts/messages';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { MessagesClient } from '../../../common/api/clinic/messages-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { PhonePipe } from '../../../common/ui/phone-words';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import type { MarkName } from '../../../common/ui/state-mark/mark-shapes';
import { StateMark } from '../../../common/ui/state-mark/state-mark';

/** What goes out to whom, in which exact words, and how far it has come. */
@Component({
  selector: 'td-messages',
  imports: [RouterLink, SheetStates, StateMark, MomentPipe, PhonePipe],
  templateUrl: './messages.html',
  styleUrl: './messages.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Messages {
  private readonly client = inject(MessagesClient);
  private readonly router = inject(Router);

  /** From the address, so that a filtered sheet can be sent on: 'waiting', 'sent' or 'failed', a channel, a child. */
  readonly show = input<string>();
  readonly channel = input<string>();
  readonly child = input<string>();
  protected readonly user = inject(ClinicUser);
  protected readonly zone = this.user.zone;
  protected readonly query = computed<MessagesQuery>(() => {
    const childId = Number(this.child());
    const way = this.channel();
    return {
      show: messageShows.find((one) => one === this.show()) ?? 'all',
      channel: way === 'sms' || way === 'mail' ? way : null,
      childId: Number.isInteger(childId) && childId > 0 ? childId : null,
    };
  });
  protected readonly loaded = new Loaded(() => this.client.list(this.query()));
  protected readonly health = computed(() => this.loaded.value()?.health ?? null);
  protected readonly messages = computed(() => this.loaded.value()?.messages ?? []);
  /** More than are shown. */
  protected readonly total = computed(() => this.loaded.value()?.total ?? 0);
  protected readonly mayRetry = computed(
    () => this.user.session()?.staff.rights.includes('calls.write') ?? false,
  );
  protected readonly busyWith = signal<number | null>(null);
  protected readonly trouble = signal<{ readonly id: number; readonly says: string } | null>(null);
  protected readonly choices = [
    { show: 'all', says: $localize`:@@clinic.messages.all:All` },
    { show: 'waiting', says: $localize`:@@clinic.messages.waiting:Waiting` },
    { show: 'sent', says: $localize`:@@clinic.messages.sent:Sent` },
    { show: 'failed', says: $localize`:@@clinic.messages.failed:Not sent` },
  ];

  protected readonly ways = [
    { channel: null, says: $localize`:@@clinic.messages.any-way:Texts and e-mails` },
    { channel: 'sms', says: $localize`:@@clinic.messages.only-sms:Texts` },
    { channel: 'mail', says: $localize`:@@clinic.messages.only-mail:E-mails` },
  ];

  constructor() {
    effect(() => {
      this.query();
      untracked(() => void this.loaded.again());
    });
    inject(LiveClient)
      .news.pipe(
        filter((news) => ['messages', 'opened'].includes(news.topic)),
        debounceTime(300),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }

  protected filterBy(more: { show?: string | null; channel?: string | null; child?: null }): void {
    const queryParams = more.show === 'all' ? { ...more, show: null } : more;
    void this.router.navigate([], { queryParams, queryParamsHandling: 'merge' });
  }

  protected async retry({ id }: MessageItem): Promise<void> {
    if (this.busyWith() !== null) return;
    this.busyWith.set(id);
    this.trouble.set(null);
    try {
      await this.client.retry(id);
      await this.loaded.again();
    } catch (error) {
      this.trouble.set({ id, says: clinicFailure(error).message });
    } finally {
      this.busyWith.set(null);
    }
  }

  /** A text may begin with the clinic's name in other letters: its direction is that of its language. */
  protected dirOf(language: string): 'ltr' | 'rtl' {
    return isLanguageId(language) ? languageOf(language).dir : 'ltr';
  }

  protected markOf({ state }: { state: string }): MarkName {
    return marks[state] ?? 'unsure';
  }

  protected isTrouble(state: string): boolean {
    return state === 'failed' || state === 'given-up';
  }
}

const marks: Record<string, MarkName | undefined> = {
  queued: 'late',
  sending: 'way',
  sent: 'way',
  delivered: 'yes',
  failed: 'no',
  'given-up': 'ceiling',
  withdrawn: 'none',
};
