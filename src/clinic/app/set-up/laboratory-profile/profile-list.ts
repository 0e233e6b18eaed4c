import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { ProfilesClient } from '../../../../common/api/clinic/protocols-client';
import { VersionList } from '../versions/version-list';

@Component({
  selector: 'td-profile-list',
  imports: [RouterLink, VersionList],
  template: `
    <div class="lead">
      <h1 tabindex="-1" i18n="@@clinic.profiles.heading">Laboratory profile</h1>
      <p class="where" i18n="@@clinic.profiles.lead">
        When the laboratory receives, how fast a specimen must get there, and when each result is
        due. Specimen clocks and due days come from the version in force on the morning.
      </p>
      <p>
        <a routerLink="/set-up" i18n="@@clinic.versions.back">Set-up</a>
      </p>
    </div>
    <td-version-list [client]="client" [address]="address" />
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ProfileList {
  protected readonly client = inject(ProfilesClient);
  protected readonly address = '/set-up/laboratory-profile';
}
