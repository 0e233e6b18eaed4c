import type { SayItBack } from '../../shared/contracts/say-it-back';
import type { Instant } from '../../shared/domain/day';
import { recordViewOnce } from '../access-record/record-view-once';
import type { Actor } from '../access-record/record';
import type { FamilyVisitor } from '../auth/current-user';
import type { Context } from '../context';
import { familyWords, wordsFrom, type FamilyWords } from '../fasting/family-words';
import { householdOf, type Household } from '../fasting/household-night';
import { sayBackNightOf, type SayBackNight } from './say-back-night';
import { isSetSigned, questionWords } from './say-back-words';

/** The questions of the next night that this visitor is asked; helpers are asked about the mornings given to them. */
export async function sayItBackOf(
  context: Context,
  actor: Actor,
  visitor: FamilyVisitor,
): Promise<SayItBack> {
  const now = context.clock.now();
  const household = await householdOf(context.db, visitor, now);
  const words = await familyWords(context, visitor.language, household.next?.site ?? null);
  const sayBack = await offeredNight(context, household, words, now);
  await recordViewOnce(context, actor, {
    matter: 'say-it-back',
    childIds: sayBack?.children.map(({ morning }) => morning.childId) ?? [],
    detail: { on: sayBack?.night.on ?? null },
    at: now,
  });
  return sayBack ? pageOf(sayBack, words, now) : nothingToSay(words, now);
}

/** The label of the link on the family's first page; null while there is nothing to ask. */
export async function sayItBackCard(
  context: Context,
  household: Household,
  words: FamilyWords,
  now: Instant,
): Promise<string | null> {
  // What the card needs to be signed is not what its page has used.
  const own = wordsFrom(words.wording, words.zone);
  const sayBack = await offeredNight(context, household, own, now);
  return sayBack && sayBack.standing.pending.length > 0 ? own.text('say-back.card') : null;
}

async function offeredNight(
  { db }: Pick<Context, 'db'>,
  { next }: Household,
  words: FamilyWords,
  now: Instant,
): Promise<SayBackNight | null> {
  // Once the morning is here its own question comes first.
  if (!next || now >= next.questionOpensAt) return null;
  const sayBack = await sayBackNightOf(db, next);
  return sayBack && isSetSigned(sayBack, words) ? sayBack : null;
}

function nothingToSay(words: FamilyWords, now: Instant): SayItBack {
  return {
    now: new Date(now).toISOString(),
    state: 'none',
    on: null,
    heading: words.text('say-back.none'),
    says: words.text('say-back.none-says'),
    questions: [],
    total: 0,
  };
}

export function pageOf(sayBack: SayBackNight, words: FamilyWords, now: Instant): SayItBack {
  const { pending, notUnderstood } = sayBack.standing;
  const common = {
    now: new Date(now).toISOString(),
    on: sayBack.night.on,
    total: sayBack.asked.length,
  };
  if (pending.length === 0)
    return {
      ...common,
      state: 'done',
      heading: words.text('say-back.done'),
      says: words.text(notUnderstood.length > 0 ? 'say-back.we-call' : 'say-back.done-says'),
      questions: [],
    };
  const isAgain = (pending[0]?.tries ?? 0) > 0;
  return {
    ...common,
    state: 'open',
    heading: words.text('say-back.card'),
    says: words.text(isAgain ? 'say-back.once-more' : 'say-back.says'),
    questions: pending.map(({ question, tries }) => {
      const { childId, face, asks, choices } = questionWords(question, sayBack, words);
      return { question, tries, childId, face, asks, choices };
    }),
  };
}
