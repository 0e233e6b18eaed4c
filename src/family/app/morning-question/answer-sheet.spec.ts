import type { MorningQuestion } from '../../../../shared/contracts/family-morning';
import {
  checkRequest,
  isAllNothing,
  questionStep,
  stepAfter,
  stepName,
  toldUs,
} from './answer-sheet';
import { submissionKey } from './submission-key';

const asked = (morningId: number, callMe: string): MorningQuestion['questions'][number] => ({
  morningId,
  childId: morningId,
  callMe,
  face: 'baby',
  asks: '',
  hint: '',
  choices: [
    { answer: 'nothing', picture: 'water-not', says: 'Nothing' },
    { answer: 'feed', picture: 'formula-bottle', says: 'A bottle or food' },
  ],
  whenAsks: '',
  whenHint: '',
  whenChoices: [
    { at: '2027-04-14T07:30:00.000Z', says: '3:30 at night', sky: 'night' },
    { at: null, says: 'I do not know', sky: 'night' },
  ],
});
const questions = [asked(12, 'Maryam'), asked(11, 'Yusuf')];
const question = { on: '2027-04-14', questions } as MorningQuestion;

describe('one question a screen', () => {
  it('asks when after a feed, and goes on after everything else', () => {
    const first = { kind: 'eaten' as const, index: 0 };
    expect(stepAfter(first, 'feed', questions)).toEqual({ kind: 'when', index: 0 });
    for (const answer of ['nothing', 'sip', 'unsure'] as const) {
      expect(stepAfter(first, answer, questions)).toEqual({ kind: 'eaten', index: 1 });
    }
    expect(stepAfter({ kind: 'when', index: 0 }, 'feed', questions)).toEqual({
      kind: 'eaten',
      index: 1,
    });
    expect(stepAfter({ kind: 'eaten', index: 1 }, 'nothing', questions)).toBeNull();
  });

  it('names its screens in the address and reads them back', () => {
    for (const step of [
      { kind: 'eaten' as const, index: 0 },
      { kind: 'when' as const, index: 1 },
    ]) {
      expect(questionStep(stepName(step), 2)).toEqual(step);
    }
    expect(questionStep('q3', 2)).toBeNull();
    expect(questionStep('ill', 2)).toBeNull();
    expect(questionStep(undefined, 2)).toBeNull();
  });
});

describe('what is sent', () => {
  const sheet = new Map([
    [12, { answer: 'feed' as const, lastIntakeAt: '2027-04-14T07:30:00.000Z' }],
    [11, { answer: 'nothing' as const, lastIntakeAt: null }],
  ]);
  const request = checkRequest(question, sheet, 'key', '2027-04-14T09:14:00.000Z');

  it('holds every answer with its instant, and both the day and the time of answering', () => {
    expect(request).toEqual({
      submissionKey: 'key',
      on: '2027-04-14',
      deviceAt: '2027-04-14T09:14:00.000Z',
      answers: [
        { morningId: 12, answer: 'feed', lastIntakeAt: '2027-04-14T07:30:00.000Z' },
        { morningId: 11, answer: 'nothing', lastIntakeAt: null },
      ],
    });
  });

  it('is told back in the words that were tapped', () => {
    expect(toldUs(question, request).map(({ callMe, says }) => [callMe, says])).toEqual([
      ['Maryam', ['A bottle or food', '3:30 at night']],
      ['Yusuf', ['Nothing']],
    ]);
  });

  it('can be replaced by a text only when it says nothing for every child', () => {
    expect(isAllNothing(request)).toBe(false);
    expect(
      isAllNothing({
        ...request,
        answers: [{ morningId: 11, answer: 'nothing', lastIntakeAt: null }],
      }),
    ).toBe(true);
  });

  it('carries a random UUID of version 4', () => {
    const random = { getRandomValues: <T>(bytes: T) => (bytes as Uint8Array).fill(255) as T };
    expect(submissionKey(random)).toBe('ffffffff-ffff-4fff-bfff-ffffffffffff');
  });
});
