import { QueryTypes, type Transaction } from 'sequelize';
import type { z } from 'zod';
import type { LetterSigned, signLetterRequest } from '../../shared/contracts/letters';
import { dayOf } from '../../shared/domain/zone';
import { familyDay } from '../../shared/languages/family-time';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { checkPasswordAgain } from '../auth/password-again';
import type { Context } from '../context';
import { inTransaction, select } from '../database/connection';
import { notFound, Problem } from '../http/problem';
import { announce } from '../live/announce';
import { clinicWording } from '../wording/clinic-words';
import type { Wording } from '../wording/render';
import { letterCaseOf, type Choices, type LetterCase } from './letter-case';
import { letterConditions } from './letter-conditions';
import { factsOf, signerName, unsignedRecipients, wordingsFor } from './letter-desk';
import { releaseIn, sameIds } from './release-letter';
import { isLeftOut, letterParts, wordingKeysOf, type LetterFacts, type Tone } from './letter-parts';

/** A letter as it was signed, in one language; later changes of wording do not reach it. */
export interface LetterBody {
  readonly title: string;
  readonly clinicName: string;
  readonly dateSays: string;
  readonly paragraphs: readonly {
    readonly key: string;
    readonly heading: string | null;
    readonly text: string;
    readonly tone: Tone;
  }[];
  readonly wordingVersions: Readonly<Record<string, number>>;
}

export function letterBody(wording: Wording, facts: LetterFacts, choices: Choices): LetterBody {
  const parts = letterParts(wording, facts, choices);
  const keys = wordingKeysOf(parts, facts, choices);
  return {
    title: wording.text(`letter.title.${facts.choice.letter}`, { name: facts.callMe }),
    clinicName: facts.clinicName,
    dateSays: familyDay(facts.today, wording.profile).text,
    paragraphs: parts
      .filter((part) => !isLeftOut(part, choices))
      .map(({ key, heading, text, tone }) => ({ key, heading, text: text ?? '', tone })),
    wordingVersions: wording.versions(keys),
  };
}

/** What a letter was made from; the same choice signed twice is one letter. */
const fingerprint = (one: LetterCase, choices: Choices): string =>
  JSON.stringify({
    letter: one.choice.letter,
    results: one.series.rows.map((row) => row.id).sort((a, b) => a - b),
    medicines: choices.medicines,
    medicinesOn: choices.medicinesOn,
    nextVisitAt: choices.nextVisitAt,
    leftOut: [...choices.leftOut].sort(),
  });

interface ExistingLetter {
  readonly id: number;
  readonly state: 'signed' | 'released';
  readonly choice: { readonly fingerprint: string; readonly results: readonly number[] };
  readonly is_final: number;
}

/** The same letter signed before, or null. @throws Problem 409 when these results already have their final letter. */
async function existing(
  context: Context,
  transaction: Transaction,
  one: LetterCase,
  choices: Choices,
): Promise<ExistingLetter | null> {
  const letters = await select<ExistingLetter>(
    context.db,
    `SELECT id, state, choice, is_final FROM letters WHERE series_id = :seriesId AND state <> 'withdrawn'`,
    { seriesId: one.series.id },
    transaction,
  );
  const mine = fingerprint(one, choices);
  const same = letters.find((letter) => letter.choice.fingerprint === mine);
  if (same) return same;
  const results = one.series.rows.map((row) => row.id);
  if (letters.some((letter) => letter.is_final && sameIds(letter.choice.results, results)))
    throw new Problem(
      409,
      'already-written',
      'The final letter about these results is signed. A new one needs a new or corrected result.',
    );
  return null;
}

async function insertLetter(
  context: Context,
  transaction: Transaction,
  staff: StaffMember,
  one: LetterCase,
  choices: Choices,
  facts: LetterFacts,
  clinic: Wording,
  wordings: ReadonlyMap<string, Wording>,
): Promise<number> {
  const now = new Date(context.clock.now());
  const [letterId] = await context.db.query(
    `INSERT INTO letters (series_id, child_id, kind, state, is_final, choice, medicines, medicines_on, next_visit_at,
       clinic_language, clinic_body, signed_by_staff_id, signed_at)
     VALUES (:seriesId, :childId, :kind, 'signed', :isFinal, :choice, :medicines, :medicinesOn, :nextVisitAt,
       :clinicLanguage, :clinicBody, :staffId, :now)`,
    {
      type: QueryTypes.INSERT,
      transaction,
      replacements: {
        seriesId: one.series.id,
        childId: one.series.childId,
        kind: one.choice.letter,
        isFinal: one.choice.letter !== 'still-waiting',
        choice: JSON.stringify({
          fingerprint: fingerprint(one, choices),
          results: one.series.rows.map((row) => row.id),
          sentences: one.choice.sentences,
          mustHaveHappened: one.choice.mustHaveHappened,
        }),
        medicines: choices.medicines,
        medicinesOn: choices.medicinesOn,
        nextVisitAt: choices.nextVisitAt === null ? null : new Date(choices.nextVisitAt),
        clinicLanguage: clinic.language,
        clinicBody: JSON.stringify(letterBody(clinic, facts, choices)),
        staffId: staff.id,
        now,
      },
    },
  );
  for (const to of one.recipients) {
    const wording = wordings.get(to.language);
    if (!wording) throw new Error(`No wording in ${to.language}`);
    await context.db.query(
      `INSERT INTO letter_recipients (letter_id, family_member_id, language, body)
       VALUES (:letterId, :familyMemberId, :language, :body)`,
      {
        transaction,
        replacements: {
          letterId,
          familyMemberId: to.familyMemberId,
          language: to.language,
          body: JSON.stringify(letterBody(wording, facts, choices)),
        },
      },
    );
  }
  return letterId;
}

/**
 * Signs the letter that the results allow, with the password entered again, and releases it when asked to.
 * The same letter signed twice is one letter.
 * @throws Problem 404; 409 'results-changed' when results arrived under the reader, 'not-ready' with what is missing,
 * 'already-written'; 422 for a wrong password.
 */
export async function signLetter(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  seriesId: number,
  request: z.output<typeof signLetterRequest>,
): Promise<LetterSigned> {
  await checkPasswordAgain(context, staff, request.password);
  const now = context.clock.now();
  const signer = await signerName(context, staff.id);
  return inTransaction(context.db, async (transaction) => {
    await select(
      context.db,
      'SELECT id FROM series WHERE id = :seriesId FOR UPDATE',
      { seriesId },
      transaction,
    );
    const one = await letterCaseOf(context.db, staff.siteId, seriesId, transaction);
    if (!one) throw notFound('This series');
    if (
      !sameIds(
        request.resultsSeen,
        one.series.rows.map((row) => row.id),
      )
    )
      throw new Problem(
        409,
        'results-changed',
        'A result has changed since you opened this letter. Read it again before you sign.',
      );
    const { choices } = request;
    const before = await existing(context, transaction, one, choices);
    if (before && (before.state === 'released' || !request.release))
      return { letterId: before.id, state: before.state };
    let letterId = before?.id;
    if (letterId === undefined) {
      const today = dayOf(now, one.facts.zone);
      const facts = factsOf(one, today, signer);
      const wordings = await wordingsFor(context, one, transaction);
      // The one who signs reads the letter in the language of the screen.
      const clinic = await clinicWording(context.db, staff.language, transaction);
      const keys = wordingKeysOf(letterParts(clinic, facts, choices), facts, choices);
      const unsigned = unsignedRecipients(one, wordings, keys);
      const open = letterConditions({ one, choices, now, today, unsigned, wording: clinic }).filter(
        (condition) => !condition.isMet,
      );
      if (open.length > 0)
        throw new Problem(409, 'not-ready', 'This letter cannot be signed yet.', {
          detail: open.map((condition) => condition.says).join(' '),
          errors: open.map(({ key, field, says }) => ({ path: field ?? key, message: says })),
        });
      letterId = await insertLetter(
        context,
        transaction,
        staff,
        one,
        choices,
        facts,
        clinic,
        wordings,
      );
      await record(context.db, transaction, actor, {
        action: 'changed',
        matter: 'letter-signed',
        childIds: [one.series.childId],
        detail: { letterId, letter: one.choice.letter },
        at: now,
      });
    }
    if (request.release)
      await releaseIn(context, transaction, actor, staff, letterId, one.series.childId);
    await announce(context.db, transaction, 'letters', letterId);
    return { letterId, state: request.release ? 'released' : 'signed' };
  });
}
