import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { ProtocolsClient } from '../../../../common/api/clinic/protocols-client';
import { VersionList } from '../versions/version-list';

@Component({
  selector: 'td-protocol-list',
  imports: [RouterLink, VersionList],
  template: `
    <div class="lead">
      <h1 tabindex="-1" i18n="@@clinic.protocols.heading">Fasting protocol</h1>
      <p class="where" i18n="@@clinic.protocols.lead">
        Least and longest hours by age. Every family’s times are computed from the version that is
        in force on its morning.
      </p>
      <p>
        <a routerLink="/set-up" i18n="@@clinic.versions.back">Set-up</a>
      </p>
    </div>
    <td-version-list [client]="client" [address]="address" />
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ProtocolList {
  protected readonly client = inject(ProtocolsClient);
  protected readonly address = '/set-up/fasting-protocol';
}
