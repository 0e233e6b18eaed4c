import { TestBed } from '@angular/core/testing';
import { provideRouter } from '@angular/router';
import type {
  SayBackAnswered,
  SayBackAnswerRequest,
  SayItBack,
} from '../../../../shared/contracts/say-it-back';
import { FamilyFailure } from '../../../common/api/family/family-failure';
import { SayItBackClient } from '../../../common/api/family/say-it-back-client';
import { FamilyClock } from '../../../common/session/family-clock';
import { FamilyVisit } from '../../../common/session/family-visit';
import { SayItBackPage } from './say-it-back';

const question: SayItBack['questions'][number] = {
  question: 'water',
  tries: 0,
  childId: 1,
  face: 'toddler',
  asks: 'It is 5:00. May Emre have a sip of water?',
  choices: [
    { choice: 'yes', picture: 'sip', says: 'Yes, a sip is fine' },
    { choice: 'no', picture: 'water-not', says: 'No, not even water' },
  ],
};
const open: SayItBack = {
  now: '2027-04-12T20:00:00.000Z',
  state: 'open',
  on: '2027-04-13',
  heading: 'Is the plan clear?',
  says: 'This is no test.',
  questions: [question],
  total: 3,
};
const done: SayItBack = { ...open, state: 'done', heading: 'Thank you', questions: [] };
const wrong: SayBackAnswered = {
  isRight: false,
  heading: 'Let us look at it once more.',
  says: 'No water at 5:00.',
  picture: 'water-not',
  next: done,
};

async function screen(page: SayItBack = open) {
  const client = {
    questions: jest.fn(() => Promise.resolve(page)),
    answer: jest.fn<Promise<SayBackAnswered>, [SayBackAnswerRequest]>(() => Promise.resolve(wrong)),
  };
  TestBed.configureTestingModule({
    providers: [
      provideRouter([]),
      { provide: SayItBackClient, useValue: client },
      { provide: FamilyClock, useValue: { instant: () => '2027-04-12T20:00:05.000Z' } },
      { provide: FamilyVisit, useValue: { clinic: () => null, session: () => ({}) } },
    ],
  });
  const fixture = TestBed.createComponent(SayItBackPage);
  await fixture.whenStable();
  const element = fixture.nativeElement as HTMLElement;
  const press = async (name: string): Promise<void> => {
    [...element.querySelectorAll('button')].find((one) => one.textContent.includes(name))?.click();
    await fixture.whenStable();
  };
  return { client, element, press };
}

beforeAll(() => {
  window.scrollTo = jest.fn();
  Object.defineProperty(globalThis.crypto, 'randomUUID', {
    configurable: true,
    value: () => 'key-1',
  });
});

it('asks one question as a group whose name is the question', async () => {
  const { element } = await screen();
  const group = element.querySelector('fieldset');
  expect(group?.querySelector('legend h1')?.textContent).toContain(question.asks);
  expect(
    [...(group?.querySelectorAll('button') ?? [])].map((one) => one.textContent.trim()),
  ).toEqual(['Yes, a sip is fine', 'No, not even water']);
  expect(element.textContent).toContain('Question 3 of 3.');
});

it('sends the choice with the phone’s time, explains it as a live message, and moves on', async () => {
  const { client, element, press } = await screen();
  await press('Yes, a sip');
  expect(client.answer).toHaveBeenCalledWith({
    submissionKey: 'key-1',
    on: '2027-04-13',
    question: 'water',
    tries: 0,
    choice: 'yes',
    deviceAt: '2027-04-12T20:00:05.000Z',
  });
  expect(element.querySelector('[role=status]')?.textContent).toBe('No water at 5:00.');
  await press('Go on');
  expect(element.querySelector('h1')?.textContent).toBe('Thank you');
});

it('says that it needs signal, and sends the same answer again', async () => {
  const { client, element, press } = await screen();
  client.answer.mockRejectedValueOnce(new FamilyFailure('unreached', null));
  await press('No, not even');
  expect(element.textContent).toContain('These questions need signal.');
  await press('Try again');
  expect(client.answer).toHaveBeenCalledTimes(2);
  expect(client.answer.mock.calls[1]).toEqual(client.answer.mock.calls[0]);
  expect(element.textContent).toContain('No water at 5:00.');
});

it('sends nothing twice while an answer is on its way', async () => {
  const { client, element } = await screen();
  const [first] = element.querySelectorAll<HTMLButtonElement>('fieldset button');
  first?.click();
  first?.click();
  expect(client.answer).toHaveBeenCalledTimes(1);
});
