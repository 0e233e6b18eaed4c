import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { RouterLink } from '@angular/router';
import { filter } from 'rxjs';
import { clinicFailure } from '../../../common/api/clinic/clinic-http';
import { LettersClient } from '../../../common/api/clinic/letters-client';
import { LiveClient } from '../../../common/api/clinic/live-client';
import { ClinicUser } from '../../../common/session/clinic-user';
import { MomentPipe } from '../../../common/ui/clinic-times';
import { Loaded } from '../../../common/ui/loaded';
import { SheetStates } from '../../../common/ui/sheet-states/sheet-states';
import { StateMark } from '../../../common/ui/state-mark/state-mark';

/** Letters to write, to release, released; and who has opened them. */
@Component({
  selector: 'td-letters',
  imports: [SheetStates, StateMark, RouterLink, MomentPipe],
  templateUrl: './letters.html',
  styleUrl: './letters.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Letters {
  private readonly client = inject(LettersClient);
  private readonly user = inject(ClinicUser);

  protected readonly zone = this.user.zone;
  protected readonly loaded = new Loaded(() => this.client.list());
  protected readonly letters = computed(() => this.loaded.value()?.letters ?? []);
  protected readonly toWrite = computed(
    () => this.letters().filter((letter) => letter.state === 'to-write').length,
  );
  protected readonly mayRelease = computed(() => this.user.has('letters.release'));
  protected readonly isBusy = signal(false);
  protected readonly says = signal<string | null>(null);

  constructor() {
    void this.loaded.again();
    inject(LiveClient)
      .news.pipe(
        filter((news) => ['letters', 'results', 'opened'].includes(news.topic)),
        takeUntilDestroyed(),
      )
      .subscribe(() => void this.loaded.again());
  }

  protected pdf(letterId: number): string {
    return this.client.pdfAddress(letterId);
  }

  protected async release(letterId: number): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.says.set(null);
    try {
      await this.client.release(letterId);
    } catch (error) {
      this.says.set(clinicFailure(error).message);
    } finally {
      this.isBusy.set(false);
      await this.loaded.again();
    }
  }
}
