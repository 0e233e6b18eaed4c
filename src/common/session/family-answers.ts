import { DOCUMENT, DestroyRef, Injectable, inject, signal } from '@angular/core';
import type {
  FastingCheckRequest,
  MorningChangeRequest,
  MorningOutcome,
} from '../../../shared/contracts/family-morning';
import { type FamilyFailure, familyFailure } from '../api/family/family-failure';
import { MorningClient } from '../api/family/morning-client';
import { FamilyPhone } from './family-phone';

const WAITING = 'waiting-answers';
const FIRST_RETRY_MS = 5_000;
const LONGEST_RETRY_MS = 120_000;

/** Something the family said that the clinic does not have yet, as far as this phone knows. */
export type WaitingAnswer =
  | { kind: 'check'; request: FastingCheckRequest }
  | { kind: 'change'; request: MorningChangeRequest };

/** What the clinic said, and about which morning. */
export interface ReceivedOutcome {
  on: string;
  outcome: MorningOutcome;
}

export interface RefusedAnswer {
  waiting: WaitingAnswer;
  failure: FamilyFailure;
}

const sameMatter = (a: WaitingAnswer, b: WaitingAnswer) =>
  a.kind === b.kind &&
  a.request.on === b.request.on &&
  (a.kind === 'check' || (b.kind === 'change' && a.request.kind === b.request.kind));

/**
 * Answers are written to the phone first and then sent, again and again until the clinic answers. Sending twice is
 * harmless (submission key), losing one is not.
 */
@Injectable({ providedIn: 'root' })
export class FamilyAnswers {
  private readonly client = inject(MorningClient);
  private readonly phone = inject(FamilyPhone);
  private readonly document = inject(DOCUMENT);
  private readonly queue = signal<readonly WaitingAnswer[]>([]);
  private readonly last = signal<ReceivedOutcome | null>(null);
  private readonly refusal = signal<RefusedAnswer | null>(null);
  private readonly busy = signal(false);
  private readonly trouble = signal<FamilyFailure | null>(null);
  private timer: ReturnType<typeof setTimeout> | null = null;
  private retryMs = FIRST_RETRY_MS;
  private begun: Promise<void> | null = null;
  private saving: Promise<void> = Promise.resolve();

  readonly waiting = this.queue.asReadonly();
  /** What the clinic said to the answer sent last. */
  readonly outcome = this.last.asReadonly();
  /** An answer that the clinic has read and did not take. */
  readonly refused = this.refusal.asReadonly();
  readonly isSending = this.busy.asReadonly();
  /** Why the last attempt did not get through. */
  readonly failure = this.trouble.asReadonly();

  constructor() {
    const again = () => {
      if (this.document.visibilityState !== 'hidden') void this.send();
    };
    const window = this.document.defaultView;
    window?.addEventListener('online', again);
    this.document.addEventListener('visibilitychange', again);
    inject(DestroyRef).onDestroy(() => {
      window?.removeEventListener('online', again);
      this.document.removeEventListener('visibilitychange', again);
      this.rest();
    });
  }

  /** Reads what an earlier visit left and sends it. Safe to call often. */
  async start(): Promise<void> {
    this.begun ??= this.phone.read<WaitingAnswer[]>(WAITING).then((kept) => {
      if (kept !== null) this.queue.update((queue) => [...kept, ...queue]);
    });
    await this.begun;
    await this.send();
  }

  /** Resolves when it was tried once; `waiting` then says whether the clinic has it. */
  async handIn(answer: WaitingAnswer): Promise<void> {
    await (this.begun ?? this.start());
    this.refusal.set(null);
    this.last.set(null);
    await this.write((queue) => [...queue.filter((other) => !sameMatter(other, answer)), answer]);
    await this.send();
  }

  async send(): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    this.rest();
    try {
      for (let next = this.queue()[0]; next; next = this.queue()[0]) await this.sendOne(next);
      this.retryMs = FIRST_RETRY_MS;
      this.trouble.set(null);
    } catch (error) {
      const failure = familyFailure(error);
      this.trouble.set(failure);
      if (failure.kind !== 'signed-out') this.tryLater();
    } finally {
      this.busy.set(false);
    }
  }

  private async sendOne(answer: WaitingAnswer): Promise<void> {
    try {
      const outcome =
        answer.kind === 'check'
          ? await this.client.answer(answer.request)
          : await this.client.change(answer.request);
      // A correction made while this one was on its way makes its outcome old.
      if (this.queue().includes(answer)) this.last.set({ on: answer.request.on, outcome });
    } catch (error) {
      const failure = familyFailure(error);
      if (failure.mayPass) throw failure;
      if (this.queue().includes(answer)) this.refusal.set({ waiting: answer, failure });
    }
    await this.write((queue) => queue.filter((other) => other !== answer));
  }

  /** The screen changes only when the phone has it. */
  private write(change: (queue: readonly WaitingAnswer[]) => WaitingAnswer[]): Promise<void> {
    this.saving = this.saving
      .catch(() => undefined)
      .then(async () => {
        const queue = change(this.queue());
        await this.phone.keep(WAITING, queue);
        this.queue.set(queue);
      });
    return this.saving;
  }

  private tryLater(): void {
    this.timer = setTimeout(() => void this.send(), this.retryMs);
    this.retryMs = Math.min(this.retryMs * 2, LONGEST_RETRY_MS);
  }

  private rest(): void {
    if (this.timer !== null) clearTimeout(this.timer);
    this.timer = null;
  }
}
