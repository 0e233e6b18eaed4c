import { Injectable, computed, inject, signal } from '@angular/core';
import type { FamilySession } from '../../../shared/contracts/family-session';
import { familyFailure } from '../api/family/family-failure';
import { FamilySessionClient } from '../api/family/family-session-client';
import { FamilyClock } from './family-clock';
import { FamilyPhone } from './family-phone';

const SESSION = 'session';

/** Who is on this phone, and how far they may read. */
@Injectable({ providedIn: 'root' })
export class FamilyVisit {
  private readonly client = inject(FamilySessionClient);
  private readonly phone = inject(FamilyPhone);
  private readonly clock = inject(FamilyClock);
  private readonly current = signal<FamilySession | null>(null);
  private readonly linkClinic = signal<FamilySession['clinic'] | null>(null);

  private loading: Promise<FamilySession | null> | null = null;

  readonly session = this.current.asReadonly();
  /** Known from the link already, so that the telephone number stands there before anybody is signed in. */
  readonly clinic = computed(() => this.current()?.clinic ?? this.linkClinic());

  /**
   * Resolves to the session, to the one kept on this phone when there is no signal, or to null when nobody is
   * signed in. Rejects with FamilyFailure when the clinic cannot be asked and nothing is kept.
   */
  load(): Promise<FamilySession | null> {
    this.loading ??= this.ask().finally(() => (this.loading = null));
    return this.loading;
  }

  private async ask(): Promise<FamilySession | null> {
    try {
      return await this.begin(await this.client.current());
    } catch (error) {
      const failure = familyFailure(error);
      if (failure.kind === 'signed-out') {
        await this.end();
        return null;
      }
      const kept = await this.phone.read<FamilySession>(SESSION);
      if (kept === null) throw failure;
      // What was kept cannot open letters: that needs the clinic.
      this.current.set({ ...kept, reach: 'household', freshUntil: null });
      return this.current();
    }
  }

  async begin(session: FamilySession): Promise<FamilySession> {
    this.current.set(session);
    this.clock.learn(session.now);
    await this.phone.keep(SESSION, session);
    this.turnTo(session.language);
    return session;
  }

  /** The pages in the person's own language; another language is another application and needs a full load. */
  private turnTo(language: string): void {
    const here = document.documentElement.lang;
    const { pathname, search } = location;
    if (language !== here && pathname.startsWith(`/${here}/`))
      location.replace(`/${language}${pathname.slice(here.length + 1)}${search}`);
  }

  meetClinic(clinic: FamilySession['clinic']): void {
    this.linkClinic.set(clinic);
  }

  async closeLetters(): Promise<void> {
    this.current.update(
      (session) => session && { ...session, reach: 'household', freshUntil: null },
    );
    await this.client.closeLetters();
  }

  /** Ends the visit here and there, and empties the phone. Rejects with FamilyFailure when the clinic was not reached. */
  async leave(way: 'sign-out' | 'forget'): Promise<void> {
    try {
      await (way === 'forget' ? this.client.forgetPhone() : this.client.signOut());
    } catch (error) {
      const failure = familyFailure(error);
      if (failure.kind !== 'signed-out') throw failure;
    }
    this.current.set(null);
    await this.phone.forgetEverything();
  }

  /** The session is over. Answers that the clinic does not have yet stay: they are sent after the next sign-in. */
  private async end(): Promise<void> {
    this.current.set(null);
    await this.phone.remove(SESSION);
    await this.phone.remove('next-morning');
    await this.phone.remove('morning-question');
  }
}
