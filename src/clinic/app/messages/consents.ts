import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  numberAttribute,
  type OnInit,
} from '@angular/core';
import { RouterLink } from '@angular/router';
import { isLanguageId, languageOf } from '../../../../shared/languages/languages';
import { MessagesClient } from '../../../common/api/clinic/messages-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { PhonePipe } from '../../../common/ui/phone-words';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { ConsentForm } from './consent-form';

/** How one adult may be written to: at which number, for what, and everything that was said about it. */
@Component({
  selector: 'td-consents',
  imports: [ConsentForm, MomentPipe, PhonePipe, RouterLink, SheetStates],
  templateUrl: './consents.html',
  styleUrl: './consents.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Consents implements OnInit {
  private readonly client = inject(MessagesClient);
  private readonly user = inject(ClinicUser);

  readonly familyMemberId = input.required({ transform: numberAttribute });
  protected readonly zone = this.user.zone;
  protected readonly loaded = new Loaded(() => this.client.consents(this.familyMemberId()));
  protected readonly consents = this.loaded.value;
  protected readonly mayWrite = computed(
    () => this.user.session()?.staff.rights.includes('contacts.write') ?? false,
  );

  ngOnInit(): void {
    void this.loaded.again();
  }

  protected askedBy(channel: string) {
    return this.consents()?.asked.find((one) => one.channel === channel) ?? null;
  }

  protected dirOf(language: string): 'ltr' | 'rtl' {
    return isLanguageId(language) ? languageOf(language).dir : 'ltr';
  }
}
