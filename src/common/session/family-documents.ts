import { Injectable, inject, signal, type WritableSignal } from '@angular/core';
import type { MorningQuestion, NextMorning } from '../../../shared/contracts/family-morning';
import { type FamilyFailure, familyFailure } from '../api/family/family-failure';
import { MorningClient } from '../api/family/morning-client';
import { FamilyClock } from './family-clock';
import { FamilyPhone } from './family-phone';

/** A document as the phone has it: fresh from the clinic, or kept from an earlier time. */
export interface Kept<T> {
  data: T;
  keptAt: string;
  isFresh: boolean;
}

/** The two documents that must be there with no signal: the instructions and the morning question. */
@Injectable({ providedIn: 'root' })
export class FamilyDocuments {
  private readonly client = inject(MorningClient);
  private readonly phone = inject(FamilyPhone);
  private readonly clock = inject(FamilyClock);
  private readonly morning = signal<Kept<NextMorning> | null>(null);
  private readonly asked = signal<Kept<MorningQuestion> | null>(null);
  private readonly trouble = signal<FamilyFailure | null>(null);

  readonly nextMorning = this.morning.asReadonly();
  readonly question = this.asked.asReadonly();
  /** Why the last attempt brought nothing new; null when it did. */
  readonly failure = this.trouble.asReadonly();

  /** Shows what is kept at once, then what the clinic says. Fetches the question too: it is needed where no signal is. */
  async loadNextMorning(): Promise<void> {
    await this.load('next-morning', this.morning, () => this.client.nextMorning());
    if (this.morning()?.isFresh && this.morning()?.data.question) {
      await this.load('morning-question', this.asked, () => this.client.question());
    }
  }

  async loadQuestion(): Promise<void> {
    await this.load('morning-question', this.asked, () => this.client.question());
  }

  private async load<T extends { now: string }>(
    key: string,
    place: WritableSignal<Kept<T> | null>,
    fetch: () => Promise<T>,
  ): Promise<void> {
    if (place() === null) {
      const kept = await this.phone.read<{ data: T; keptAt: string }>(key);
      if (kept !== null && place() === null) place.set({ ...kept, isFresh: false });
    }
    try {
      const data = await fetch();
      this.clock.learn(data.now);
      const keptAt = this.clock.instant();
      this.trouble.set(null);
      place.set({ data, keptAt, isFresh: true });
      await this.phone.keep(key, { data, keptAt });
    } catch (error) {
      this.trouble.set(familyFailure(error));
      place.update((kept) => kept && { ...kept, isFresh: false });
    }
  }
}
