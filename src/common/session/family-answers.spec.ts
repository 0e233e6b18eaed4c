import { TestBed } from '@angular/core/testing';
import type { MorningOutcome } from '../../../shared/contracts/family-morning';
import { FamilyFailure, type FailureKind } from '../api/family/family-failure';
import { MorningClient } from '../api/family/morning-client';
import { FamilyAnswers, type WaitingAnswer } from './family-answers';
import { FamilyPhone } from './family-phone';

const outcome = (heading: string): MorningOutcome => ({
  receivedAt: '2027-04-14T09:14:00.000Z',
  kind: 'come',
  heading,
  lines: [],
  receivedSays: 'We have your answer.',
  youToldUs: [],
  canChangeUntil: '2027-04-14T11:00:00.000Z',
});

const check = (submissionKey: string, answer: 'nothing' | 'feed' = 'nothing'): WaitingAnswer => ({
  kind: 'check',
  request: {
    submissionKey,
    on: '2027-04-14',
    deviceAt: '2027-04-14T09:14:00.000Z',
    answers: [{ morningId: 12, answer, lastIntakeAt: null }],
  },
});

const late = (submissionKey: string): WaitingAnswer => ({
  kind: 'change',
  request: {
    kind: 'late',
    submissionKey,
    on: '2027-04-14',
    newArrivalAt: '2027-04-14T11:30:00.000Z',
    deviceAt: '2027-04-14T09:20:00.000Z',
  },
});

/** A phone that keeps what it is given and says what it kept at each moment. */
class KeepingPhone {
  readonly kept = new Map<string, unknown>();
  readonly happened: string[];

  constructor(happened: string[]) {
    this.happened = happened;
  }

  read(key: string): Promise<unknown> {
    return Promise.resolve(this.kept.get(key) ?? null);
  }

  keep(key: string, value: unknown): Promise<void> {
    this.happened.push('kept');
    this.kept.set(key, JSON.parse(JSON.stringify(value)) as unknown);
    return Promise.resolve();
  }
}

/** The clinic's side: answers, or fails in the way it is told to. */
class Clinic {
  failure: { kind: FailureKind; code?: string } | null = null;
  readonly got: string[] = [];
  private held: (() => void) | null = null;
  isHolding = false;

  constructor(private readonly happened: string[]) {}

  readonly answer = (request: { submissionKey: string }) => this.take(request.submissionKey);
  readonly change = (request: { submissionKey: string }) => this.take(request.submissionKey);

  release(): void {
    this.isHolding = false;
    this.held?.();
  }

  private async take(key: string): Promise<MorningOutcome> {
    this.happened.push(`sent ${key}`);
    this.got.push(key);
    if (this.isHolding) await new Promise<void>((resolve) => (this.held = resolve));
    if (this.failure) {
      const { kind, code = 'x' } = this.failure;
      throw new FamilyFailure(kind, { type: 'about:blank', title: 'No.', status: 409, code });
    }
    return outcome(`for ${key}`);
  }
}

function set() {
  const happened: string[] = [];
  const phone = new KeepingPhone(happened);
  const clinic = new Clinic(happened);
  TestBed.configureTestingModule({
    providers: [
      { provide: FamilyPhone, useValue: phone },
      { provide: MorningClient, useValue: clinic },
    ],
  });
  return { happened, phone, clinic, answers: TestBed.inject(FamilyAnswers) };
}

const waitingKeys = (answers: FamilyAnswers) =>
  answers.waiting().map(({ request }) => request.submissionKey);

describe('the offline queue', () => {
  beforeEach(() => jest.useFakeTimers());
  afterEach(() => jest.useRealTimers());

  it('writes the answer to the phone before it sends it, and empties the phone after', async () => {
    const { answers, happened, phone } = set();
    await answers.handIn(check('a'));
    expect(happened).toEqual(['kept', 'sent a', 'kept']);
    expect(phone.kept.get('waiting-answers')).toEqual([]);
    expect(answers.waiting()).toEqual([]);
    expect(answers.outcome()?.outcome.heading).toBe('for a');
  });

  it.each(['unreached', 'broken', 'too-often'] as const)(
    'keeps the answer, without any outcome, when the way is %s',
    async (kind) => {
      const { answers, clinic, phone } = set();
      clinic.failure = { kind };
      await answers.handIn(check('a'));
      expect(waitingKeys(answers)).toEqual(['a']);
      expect(phone.kept.get('waiting-answers')).toHaveLength(1);
      expect(answers.outcome()).toBeNull();
      expect(answers.refused()).toBeNull();
    },
  );

  it('sends again when the phone is back online, with the same key', async () => {
    const { answers, clinic } = set();
    clinic.failure = { kind: 'unreached' };
    await answers.handIn(check('a'));
    clinic.failure = null;
    window.dispatchEvent(new Event('online'));
    await jest.advanceTimersByTimeAsync(0);
    expect(clinic.got).toEqual(['a', 'a']);
    expect(answers.waiting()).toEqual([]);
    expect(answers.outcome()?.outcome.heading).toBe('for a');
  });

  it('tries again by itself, ever less often', async () => {
    const { answers, clinic } = set();
    clinic.failure = { kind: 'unreached' };
    await answers.handIn(check('a'));
    await jest.advanceTimersByTimeAsync(5_000);
    expect(clinic.got).toHaveLength(2);
    await jest.advanceTimersByTimeAsync(9_000);
    expect(clinic.got).toHaveLength(2);
    await jest.advanceTimersByTimeAsync(1_000);
    expect(clinic.got).toHaveLength(3);
  });

  it('sends what an earlier visit left', async () => {
    const { answers, clinic, phone } = set();
    phone.kept.set('waiting-answers', [check('old'), late('later')]);
    await answers.start();
    expect(clinic.got).toEqual(['old', 'later']);
    expect(phone.kept.get('waiting-answers')).toEqual([]);
  });

  it('takes a definite no off the phone and says so', async () => {
    const { answers, clinic, phone } = set();
    clinic.failure = { kind: 'refused', code: 'morning-closed' };
    await answers.handIn(check('a'));
    expect(answers.waiting()).toEqual([]);
    expect(phone.kept.get('waiting-answers')).toEqual([]);
    expect(answers.refused()?.failure.code).toBe('morning-closed');
    expect(answers.outcome()).toBeNull();
  });

  it('keeps the answer when nobody is signed in, and does not knock again until somebody is', async () => {
    const { answers, clinic } = set();
    clinic.failure = { kind: 'signed-out' };
    await answers.handIn(check('a'));
    await jest.advanceTimersByTimeAsync(600_000);
    expect(clinic.got).toEqual(['a']);
    clinic.failure = null;
    await answers.start();
    expect(answers.outcome()?.outcome.heading).toBe('for a');
  });

  it('replaces an unsent answer by its correction and keeps other matters', async () => {
    const { answers, clinic } = set();
    clinic.failure = { kind: 'unreached' };
    await answers.handIn(check('first'));
    await answers.handIn(late('late'));
    await answers.handIn(check('second', 'feed'));
    expect(waitingKeys(answers)).toEqual(['late', 'second']);
  });

  it('never shows the outcome of an answer that was corrected while it was on its way', async () => {
    const { answers, clinic } = set();
    clinic.isHolding = true;
    const first = answers.handIn(check('first'));
    await jest.advanceTimersByTimeAsync(0);
    await answers.handIn(check('second', 'feed'));
    expect(answers.outcome()).toBeNull();
    clinic.release();
    await first;
    expect(clinic.got).toEqual(['first', 'second']);
    expect(answers.outcome()?.outcome.heading).toBe('for second');
    expect(answers.waiting()).toEqual([]);
  });
});
