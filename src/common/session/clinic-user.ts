import { Injectable, computed, inject, signal } from '@angular/core';
import type { Right } from '../../../shared/access/rights';
import type { ClinicSession } from '../../../shared/contracts/clinic-session';
import { ClinicSessionClient } from '../api/clinic/clinic-session-client';

/** Who works here now. Rights only hide what the server would refuse. */
@Injectable({ providedIn: 'root' })
export class ClinicUser {
  private readonly client = inject(ClinicSessionClient);
  private readonly current = signal<ClinicSession | null | undefined>(undefined);
  private loading: Promise<ClinicSession | null> | null = null;

  /** undefined until it is known, null when nobody is signed in. */
  readonly session = this.current.asReadonly();
  readonly zone = computed(() => this.current()?.site.zone ?? 'UTC');

  /** Asks the server once; later calls answer from memory. */
  async known(): Promise<ClinicSession | null> {
    const session = this.current();
    if (session !== undefined) return session;
    this.loading ??= this.client.current().finally(() => (this.loading = null));
    const answer = await this.loading;
    this.current.set(answer);
    return answer;
  }

  has(right: Right): boolean {
    return this.current()?.staff.rights.includes(right) ?? false;
  }

  async signIn(email: string, password: string): Promise<void> {
    this.current.set(await this.client.signIn({ email, password }));
  }

  async signOut(): Promise<void> {
    await this.client.signOut();
    this.current.set(null);
  }

  /** The server no longer knows this session. */
  forget(): void {
    this.current.set(null);
  }
}
