import type { SayBackQuestionAsked } from '../../shared/contracts/say-it-back';
import type { Instant } from '../../shared/domain/day';
import { sayBackChoices, type SayBackQuestion } from '../../shared/domain/say-it-back';
import { faceOf, type FamilyWords } from '../fasting/family-words';
import { skyAt } from '../fasting/sky';
import { shownPhone } from '../messages/shown-phone';
import { aboutOf, type SayBackNight } from './say-back-night';

export interface QuestionWords extends Omit<SayBackQuestionAsked, 'tries'> {
  /** Read after any answer, right or not. */
  readonly explains: string;
}

const skyPictures = {
  evening: 'dusk',
  night: 'moon',
  'first-light': 'dawn',
  morning: 'dawn',
} as const;

const pictures: Readonly<Record<string, string>> = {
  'water.yes': 'water',
  'water.no': 'water-not',
  'comfort.feed': 'breast-feeding',
  'comfort.hold': 'done-hug',
  'last.leave': 'leave-home',
  'last.arrive': 'arrive',
  'mistake.home': 'home',
  'mistake.tell': 'call-us',
  'mistake.silent': 'leave-home',
};

/** One question with the family's own names and times. */
export function questionWords(
  question: SayBackQuestion,
  sayBack: SayBackNight,
  words: FamilyWords,
): QuestionWords {
  const { children, night, momentAt } = sayBack;
  const [youngest] = children;
  const { morning, plan } = youngest;
  const kind = plan.isInfant ? 'feed' : 'eat';
  const key = question === 'last' ? `last.${kind}` : question;
  const at: Instant = momentAt ?? night.firstArrivalAt;
  const stopAt = question === 'last' ? plan.mealStopAt : plan.nothingAt;
  const params = {
    name: morning.callMe,
    children: words.list(aboutOf(question, children).map((child) => child.morning)),
    time: words.time(at),
    stopTime: words.stopTime(stopAt),
    phone: shownPhone(night.site.phone, night.site.country),
  };
  const times: Readonly<Record<string, string>> = {
    stop: words.stopTime(plan.mealStopAt),
    leave: words.time(plan.leaveAt),
    arrive: words.time(morning.arrivalAt),
  };
  return {
    question,
    childId: morning.childId,
    face: faceOf(morning),
    asks: words.text(`say-back.${key}.asks`, params),
    choices: sayBackChoices[question].map((choice) => ({
      choice,
      picture:
        choice === 'unsure'
          ? 'unsure'
          : (pictures[`${question}.${choice}`] ?? skyPictures[skyAt(plan.mealStopAt, words.zone)]),
      says:
        choice === 'unsure'
          ? words.text('say-back.unsure')
          : words.text(`say-back.${question}.${choice}`, { time: times[choice] ?? '' }),
    })),
    explains: words.text(`say-back.${key}.explains`, params),
  };
}

/** Texts that any answer may need; together with the questions they are the set that has to be signed. */
const everyAnswer = [
  'say-back.card',
  'say-back.right',
  'say-back.explain',
  'say-back.unsure-thanks',
  'say-back.says',
  'say-back.once-more',
  'say-back.done',
  'say-back.done-says',
  'say-back.we-call',
] as const;

/** Whether everything the family would read is signed off in its language: nobody is asked in draft words. */
export function isSetSigned(sayBack: SayBackNight, words: FamilyWords): boolean {
  if (!words.wording.isSignedOff(everyAnswer)) return false;
  for (const question of sayBack.asked) questionWords(question, sayBack, words);
  return words.wording.isSignedOff(Object.keys(words.used()));
}
