import type { Transaction } from 'sequelize';
import type { LetterDesk } from '../../shared/contracts/letters';
import { dayOf } from '../../shared/domain/zone';
import { languageOf, type LanguageId } from '../../shared/languages/languages';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import type { Context } from '../context';
import { select } from '../database/connection';
import { notFound } from '../http/problem';
import { resultsOfSpecimens } from '../results/current-results';
import { laboratorySays, specimenRows, toSpecimen } from '../specimens/specimen-rows';
import { ageInWords } from '../wording/clinic-measures';
import { clinicWording, clinicWords } from '../wording/clinic-words';
import { canSpeak, loadWording, type Wording } from '../wording/render';
import { letterCaseOf, type Choices, type LetterCase } from './letter-case';
import { letterConditions } from './letter-conditions';
import { isLeftOut, letterParts, wordingKeysOf, type LetterFacts } from './letter-parts';

export async function signerName(context: Context, staffId: number): Promise<string> {
  const [row] = await select<{ full_name: string; credentials: string | null }>(
    context.db,
    'SELECT full_name, credentials FROM staff WHERE id = :staffId',
    { staffId },
  );
  return [row?.full_name, row?.credentials].filter(Boolean).join(', ');
}

export const factsOf = (one: LetterCase, today: string, signer: string): LetterFacts => ({
  ...one.facts,
  today,
  signer,
});

/** The wording of each language that a recipient reads and that can be spoken here. */
export async function wordingsFor(
  context: Context,
  one: LetterCase,
  transaction?: Transaction,
): Promise<Map<string, Wording>> {
  const wordings = new Map<string, Wording>();
  for (const language of new Set(one.recipients.map((to) => to.language)))
    if (canSpeak(language))
      wordings.set(language, await loadWording(context.db, language, transaction));
  return wordings;
}

/** Recipients whose language is not signed off for this letter; nobody gets an unsigned text. */
export function unsignedRecipients(
  one: LetterCase,
  wordings: ReadonlyMap<string, Wording>,
  keys: readonly string[],
): string[] {
  return one.recipients
    .filter((to) => !wordings.get(to.language)?.isSignedOff(keys))
    .map((to) => to.fullName);
}

async function earlierLetters(context: Context, seriesId: number): Promise<LetterDesk['earlier']> {
  const rows = await select<{
    id: number;
    kind: string;
    state: string;
    signed_at: Date;
    released_at: Date | null;
  }>(
    context.db,
    'SELECT id, kind, state, signed_at, released_at FROM letters WHERE series_id = :seriesId ORDER BY id DESC',
    { seriesId },
  );
  return rows.map((row) => ({
    id: row.id,
    letter: row.kind,
    state: row.state,
    signedAt: row.signed_at.toISOString(),
    releasedAt: row.released_at?.toISOString() ?? null,
  }));
}

/**
 * The letter that the results of a series allow, clinic language and family language side by side, with what is still
 * missing. @throws Problem 404.
 */
export async function openLetterDesk(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  seriesId: number,
  choices: Choices,
): Promise<LetterDesk> {
  const now = context.clock.now();
  const clinicLanguage = staff.language;
  const words = clinicWords(clinicLanguage);
  const one = await letterCaseOf(context.db, staff.siteId, seriesId);
  if (!one) throw notFound('This series');
  const today = dayOf(now, one.facts.zone);
  const facts = factsOf(one, today, await signerName(context, staff.id));
  const wordings = await wordingsFor(context, one);
  const clinic = await clinicWording(context.db, clinicLanguage);
  const clinicParts = letterParts(clinic, facts, choices);
  const familyLanguage = one.recipients[0]?.language ?? clinicLanguage;
  const family = wordings.get(familyLanguage);
  const familyParts = family ? letterParts(family, facts, choices) : [];
  const keys = wordingKeysOf(clinicParts, facts, choices);
  const unsigned = unsignedRecipients(one, wordings, keys);
  const conditions = letterConditions({ one, choices, now, today, unsigned, wording: clinic });
  const rows = await specimenRows(context.db, { siteId: staff.siteId, seriesIds: [seriesId] });
  const results = await resultsOfSpecimens(context.db, words, one.series.specimenIds);
  await record(context.db, undefined, actor, {
    action: 'seen',
    matter: 'letter-desk',
    childIds: [one.series.childId],
    detail: { seriesId },
    at: now,
  });
  const title = {
    clinic: clinic.text(`letter.title.${one.choice.letter}`, { name: facts.callMe }),
    family: family?.text(`letter.title.${one.choice.letter}`, { name: facts.callMe }) ?? '',
  };
  const letterName = (letter: string): string => clinic.text(`letter.says.${letter}`);
  return {
    seriesId,
    childId: one.series.childId,
    childName: one.childName,
    ageInWords: ageInWords(words, one.bornOn, today),
    specimens: rows.map((row) => toSpecimen(words, row, results.get(row.id) ?? [], now)),
    letter: one.choice.letter,
    letterSays: letterName(one.choice.letter),
    whyNoOther: one.choice.whyNoOther.map(({ letter, reason }) =>
      clinic.text('letter.why-no-other', {
        letter: letterName(letter),
        reason: clinic.text(`letter.reason.${reason}`),
      }),
    ),
    clinicLanguage,
    recipients: one.recipients.map((to) => {
      const language = languageOf(to.language as LanguageId);
      return {
        familyMemberId: to.familyMemberId,
        fullName: to.fullName,
        language: to.language,
        languageName: language.nativeName,
        dir: language.dir,
        isSignedOff: !unsigned.includes(to.fullName),
      };
    }),
    paragraphs: [
      {
        key: 'title',
        standing: 'fixed',
        why: clinic.text('letter.standing.fixed'),
        clinicHeading: '',
        clinicText: title.clinic,
        familyHeading: '',
        familyText: title.family,
      },
      ...clinicParts.map((part, index) => ({
        key: part.key,
        standing: part.standing,
        why: clinic.text(`letter.why.${part.key}`),
        clinicHeading: part.heading ?? '',
        clinicText: isLeftOut(part, choices) ? '' : (part.text ?? ''),
        familyHeading: familyParts[index]?.heading ?? '',
        familyText: isLeftOut(part, choices) ? '' : (familyParts[index]?.text ?? ''),
      })),
    ],
    conditions,
    canBeSigned: conditions.every((condition) => condition.isMet),
    earlier: await earlierLetters(context, seriesId),
    wordingSays: clinic.draftNotice(keys) ?? '',
    laboratorySays: await laboratorySays(context.db, staff.siteId, words),
  };
}
