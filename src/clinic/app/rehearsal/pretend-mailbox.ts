import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { RehearsalState } from '../../../../shared/contracts/rehearsal';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { PretendText } from './pretend-text';

type Mailbox = RehearsalState['mailboxes'][number];
type Attachment = Mailbox['mails'][number]['attachments'][number];

/** One pretended mailbox; attachments can be taken out, so that a calendar can be tried with them. */
@Component({
  selector: 'td-pretend-mailbox',
  imports: [MomentPipe, PretendText],
  template: `<section [attr.aria-label]="mailbox().email">
    <h2 i18n="@@clinic.rehearsal.mailbox">Mailbox of {{ mailbox().name }}</h2>
    <p class="fine">
      <bdi dir="ltr">{{ mailbox().email }}</bdi>
    </p>
    @for (mail of mails(); track mail.id; let isFirst = $first) {
      <details class="sheet" [open]="isFirst">
        <summary>
          <b>{{ mail.subject }}</b> <span class="fine">{{ mail.at | tdMoment: zone() }}</span>
        </summary>
        <td-pretend-text [body]="mail.body" />
        @for (one of mail.attachments; track one.name) {
          <p>
            <a class="do" [href]="address(one)" [download]="one.name">
              <ng-container i18n="@@clinic.rehearsal.download">Save {{ one.name }}</ng-container>
            </a>
          </p>
        }
      </details>
    } @empty {
      <p class="told" i18n="@@clinic.rehearsal.no-mail">No e-mail yet.</p>
    }
  </section>`,
  styles: `
    section {
      display: grid;
      gap: var(--space-2);
    }
    h2 {
      font-size: var(--step-0);
    }
    details {
      margin: 0;
    }
    summary {
      display: flex;
      flex-wrap: wrap;
      gap: 0 var(--space-3);
      align-items: center;
      min-height: var(--target);
      padding-inline: var(--space-3);
      cursor: pointer;
    }
    details td-pretend-text,
    details p {
      display: block;
      padding: 0 var(--space-3) var(--space-3);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PretendMailbox {
  readonly mailbox = input.required<Mailbox>();
  readonly zone = input.required<string>();
  protected readonly mails = computed(() =>
    [...this.mailbox().mails].sort((a, b) => b.at.localeCompare(a.at)),
  );

  /** A link with the file in it; nothing is fetched. */
  protected address(one: Attachment): string {
    const type = one.type.split(';')[0] ?? 'text/plain';
    return `data:${type};charset=utf-8,${encodeURIComponent(one.content)}`;
  }
}
