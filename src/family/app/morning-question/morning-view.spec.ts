import type { MorningOutcome, MorningQuestion } from '../../../../shared/contracts/family-morning';
import { FamilyFailure } from '../../../common/api/family/family-failure';
import type { WaitingAnswer } from '../../../common/session/family-answers';
import { morningView, newestOutcome, type MorningFacts } from './morning-view';
import { outcomeLook } from './outcome-look';

const asked = (morningId: number): MorningQuestion['questions'][number] => ({
  morningId,
  childId: morningId,
  callMe: `Child ${morningId}`,
  face: 'baby',
  asks: 'What did your child eat?',
  hint: '',
  choices: [],
  whenAsks: 'When?',
  whenHint: '',
  whenChoices: [],
});

const question: MorningQuestion = {
  now: '2027-04-14T09:12:00.000Z',
  on: '2027-04-14',
  state: 'open',
  stateSays: '',
  skies: [],
  suns: [],
  sunsSay: '',
  questions: [asked(1), asked(2)],
  saved: { heading: '', lines: [], textInstead: '' },
  changes: {
    ill: { says: '', hint: '', asks: '', choices: [] },
    late: { says: '', asks: '', choices: [] },
    notComing: { says: '', asks: '', confirm: '' },
  },
  outcome: null,
  protocolSays: '',
};

const outcome: MorningOutcome = {
  receivedAt: question.now,
  kind: 'come',
  heading: 'Come.',
  lines: [],
  receivedSays: '',
  youToldUs: [],
  canChangeUntil: '2027-04-14T11:00:00.000Z',
};

const waiting: WaitingAnswer = {
  kind: 'check',
  request: { submissionKey: 'a', on: question.on, deviceAt: question.now, answers: [] },
};

const facts = (more: Partial<MorningFacts> = {}): MorningFacts => ({
  question,
  step: undefined,
  isOpen: true,
  sheet: new Map(),
  waiting: [],
  isSending: false,
  hasFailed: false,
  refused: null,
  outcome: null,
  ...more,
});

describe('what the dawn page shows', () => {
  it('asks the first question when nothing was answered', () => {
    expect(morningView(facts())).toEqual({ kind: 'asking', step: { kind: 'eaten', index: 0 } });
  });

  it('says when it opens while it is not open', () => {
    expect(morningView(facts({ isOpen: false })).kind).toBe('not-open');
    expect(morningView(facts({ isOpen: false, step: 'q1' })).kind).toBe('not-open');
  });

  it('never shows an outcome while an answer waits on the phone', () => {
    const view = morningView(facts({ waiting: [waiting], hasFailed: true, outcome }));
    expect(view.kind).toBe('saved');
  });

  it('says that it is sending during the first attempt only', () => {
    const first = facts({ waiting: [waiting], isSending: true });
    expect(morningView(first).kind).toBe('sending');
    expect(morningView({ ...first, hasFailed: true }).kind).toBe('saved');
  });

  it('says a refusal before an older outcome', () => {
    const refused = { waiting, failure: new FamilyFailure('refused', null) };
    expect(morningView(facts({ refused, outcome })).kind).toBe('refused');
  });

  it('shows the outcome, and the questions again on request', () => {
    expect(morningView(facts({ outcome })).kind).toBe('outcome');
    expect(morningView(facts({ outcome, step: 'q1' })).kind).toBe('asking');
    expect(morningView(facts({ outcome, step: 'late' }))).toEqual({
      kind: 'change',
      change: 'late',
    });
  });

  it('begins where an answer is missing after a reload in the middle', () => {
    expect(morningView(facts({ step: 'q2' }))).toEqual({
      kind: 'asking',
      step: { kind: 'eaten', index: 0 },
    });
  });

  it('asks when only of what was eaten', () => {
    const sheet = new Map([[1, { answer: 'nothing' as const, lastIntakeAt: null }]]);
    expect(morningView(facts({ step: 'w1', sheet }))).toMatchObject({ step: { kind: 'eaten' } });
  });

  it('takes no notice of a step that does not exist', () => {
    expect(morningView(facts({ step: 'q9', outcome })).kind).toBe('outcome');
  });
});

describe('the newest outcome of the day', () => {
  const later = { ...outcome, heading: 'Later.', receivedAt: '2027-04-14T09:30:00.000Z' };
  const asked = { ...question, outcome };

  it('is the one just received, unless somebody else answered since', () => {
    expect(newestOutcome(asked, { on: question.on, outcome: later })?.heading).toBe('Later.');
    expect(
      newestOutcome({ ...question, outcome: later }, { on: question.on, outcome })?.heading,
    ).toBe('Later.');
  });

  it('is never that of another morning', () => {
    expect(newestOutcome(question, { on: '2027-04-13', outcome: later })).toBeNull();
    expect(newestOutcome(asked, { on: '2027-04-13', outcome: later })?.heading).toBe('Come.');
  });
});

describe('the look of an outcome', () => {
  it('shows the way to the clinic only to families that come', () => {
    const kinds = [
      'call-us',
      'stay-we-call',
      'feed-now-and-call',
      'food-first',
      'emergency',
    ] as const;
    for (const kind of kinds) {
      expect(outcomeLook(kind).showsPath).toBe(false);
      expect(outcomeLook(kind).slab).not.toBe('come');
      expect(outcomeLook(kind).calls).not.toBeNull();
    }
    expect(outcomeLook('come')).toMatchObject({ slab: 'come', showsPath: true });
  });

  it('leads to the telephone when the kind is not known yet', () => {
    expect(outcomeLook('something-new' as 'come')).toMatchObject({
      slab: 'phone',
      calls: 'clinic',
    });
  });
});
