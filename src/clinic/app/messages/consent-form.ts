import {
  ChangeDetectionStrategy,
  Component,
  inject,
  input,
  linkedSignal,
  output,
  signal,
} from '@angular/core';
import type {
  AgreedAt,
  ContactConsents,
  SetContactConsentsRequest,
} from '../../../../shared/contracts/contact-consents';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { MessagesClient } from '../../../common/api/clinic/messages-client';

type How = SetContactConsentsRequest['how'];

/** What this person says now about one number; a no works at once. */
@Component({
  selector: 'td-consent-form',
  templateUrl: './consent-form.html',
  styleUrl: './consent-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ConsentForm {
  private readonly client = inject(MessagesClient);

  readonly familyMemberId = input.required<number>();
  readonly way = input.required<AgreedAt>();
  /** Whether this member of staff may write it down. */
  readonly isOpen = input.required<boolean>();
  readonly changed = output<ContactConsents>();

  protected readonly visits = linkedSignal(() => this.way().visits);
  protected readonly letters = linkedSignal(() => this.way().letters);
  protected readonly earlyMorning = linkedSignal(() => this.way().earlyMorning);
  protected readonly how = signal<How>('by-telephone');
  protected readonly isBusy = signal(false);
  protected readonly says = signal('');
  protected readonly hows: readonly { readonly how: How; readonly says: string }[] = [
    { how: 'by-telephone', says: $localize`:@@clinic.consents.by-telephone:Asked by telephone` },
    { how: 'in-person', says: $localize`:@@clinic.consents.in-person:Asked in person` },
    { how: 'on-paper', says: $localize`:@@clinic.consents.on-paper:Signed on paper` },
  ];

  protected setVisits(isAgreed: boolean): void {
    this.visits.set(isAgreed);
    if (isAgreed) return;
    this.letters.set(false);
    this.earlyMorning.set(false);
  }

  protected async submit(): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.says.set('');
    const { channel, address } = this.way();
    try {
      const now = await this.client.setConsents(this.familyMemberId(), {
        channel,
        address,
        visits: this.visits(),
        letters: this.letters(),
        earlyMorning: channel === 'sms' && this.earlyMorning(),
        how: this.how(),
      });
      this.says.set($localize`:@@clinic.consents.kept:Written down. It works from now on.`);
      this.changed.emit(now);
    } catch (error) {
      this.says.set(clinicFailure(error).message);
    } finally {
      this.isBusy.set(false);
    }
  }
}
