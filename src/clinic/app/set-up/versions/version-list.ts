import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import type { OnInit } from '@angular/core';
import { Router, RouterLink } from '@angular/router';
import { clinicFailure } from '../../../../common/api/clinic/clinic-http';
import type { VersionsClient } from '../../../../common/api/clinic/protocols-client';
import { ClinicUser } from '../../../../common/session/clinic-user';
import { DayPipe, MomentPipe } from '../../../../common/ui/clinic-times';
import { Loaded } from '../../../../common/ui/loaded';
import { SheetStates } from '../../../../common/ui/sheet-states/sheet-states';
import { stateSays } from './version-words';

/** Every version with its state; a new draft begins here. */
@Component({
  selector: 'td-version-list',
  imports: [RouterLink, SheetStates, DayPipe, MomentPipe],
  templateUrl: './version-list.html',
  styleUrl: './version-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class VersionList implements OnInit {
  private readonly router = inject(Router);
  private readonly user = inject(ClinicUser);
  private readonly submissionKey = crypto.randomUUID();

  readonly client = input.required<VersionsClient<{ readonly id: number }>>();
  /** Address of the list; a version stands under it. */
  readonly address = input.required<string>();

  protected readonly zone = this.user.zone;
  protected readonly mayWrite = computed(() => this.user.has('protocols.write'));
  protected readonly loaded = new Loaded(() => this.client().list());
  protected readonly versions = computed(() => this.loaded.value()?.versions ?? []);
  protected readonly draft = computed(() => this.versions().find(({ state }) => state === 'draft'));
  protected readonly isBusy = signal(false);
  protected readonly failure = signal<string | null>(null);
  protected readonly stateSays = stateSays;

  ngOnInit(): void {
    void this.loaded.again();
  }

  protected async begin(): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.failure.set(null);
    try {
      const { id } = await this.client().draft(this.submissionKey);
      await this.router.navigate([this.address(), id]);
    } catch (error) {
      const failure = clinicFailure(error);
      this.failure.set(failure.message);
      if (failure.code === 'draft-open') await this.loaded.again();
    } finally {
      this.isBusy.set(false);
    }
  }
}
