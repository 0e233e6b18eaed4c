import { DestroyRef, Injectable, inject, signal } from '@angular/core';
import { filter } from 'rxjs';
import { ClinicSessionClient } from '../api/clinic/clinic-session-client';
import { LiveClient } from '../api/clinic/live-client';
import { ClinicUser } from './clinic-user';

const tickMs = 10_000;

/** The clinic's time as the server tells it; this device's clock may be wrong, and in rehearsal the time is moved. */
@Injectable({ providedIn: 'root' })
export class ClinicClock {
  private readonly client = inject(ClinicSessionClient);
  private readonly user = inject(ClinicUser);
  private offsetMs = 0;
  private readonly current = signal(Date.now());

  /** Epoch milliseconds, moving on every ten seconds. */
  readonly time = this.current.asReadonly();

  constructor() {
    this.follow(this.user.session()?.now);
    const timer = setInterval(() => this.current.set(this.now()), tickMs);
    const news = inject(LiveClient)
      .news.pipe(filter(({ topic }) => topic === 'clock' || topic === 'opened'))
      .subscribe(() => void this.ask());
    inject(DestroyRef).onDestroy(() => {
      clearInterval(timer);
      news.unsubscribe();
    });
  }

  now(): number {
    return Date.now() + this.offsetMs;
  }

  /** The instant as requests carry it. */
  instant(): string {
    return new Date(this.now()).toISOString();
  }

  /** Takes over the time that came with an answer. */
  follow(serverNow: string | undefined): void {
    if (serverNow === undefined) return;
    this.offsetMs = Date.parse(serverNow) - Date.now();
    this.current.set(this.now());
  }

  private async ask(): Promise<void> {
    try {
      this.follow((await this.client.current())?.now);
    } catch {
      // The time goes on from the last answer.
    }
  }
}
