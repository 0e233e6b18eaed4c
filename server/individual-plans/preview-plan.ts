import type { z } from 'zod';
import type {
  IndividualPlanPreview,
  previewIndividualPlanRequest,
} from '../../shared/contracts/individual-plans';
import type { Feeding } from '../../shared/contracts/common';
import { ageOn, type Day } from '../../shared/domain/day';
import {
  individualPlanOf,
  individualPlanProblems,
  morningProblems,
} from '../../shared/domain/individual-plan';
import { addDays, dayOf, instantOf, localTimeOf } from '../../shared/domain/zone';
import { isLanguageId, languageOf } from '../../shared/languages/languages';
import type { Actor } from '../access-record/record';
import { recordViewOnce } from '../access-record/record-view-once';
import type { StaffMember } from '../auth/current-user';
import { childInReach } from '../children/reach';
import type { Context } from '../context';
import { select } from '../database/connection';
import { wordsFrom } from '../fasting/family-words';
import { notFound } from '../http/problem';
import { currentProtocol } from '../protocols/protocols';
import { siteOf, type Site } from '../sites/sites';
import { clinicWords, type ClinicWords } from '../wording/clinic-words';
import { canSpeak, loadWording } from '../wording/render';
import { fastingPlanSays } from '../fasting/explain-fast';
import { morningsToCome } from './individual-plans';
import { arePhrasesSigned, ownPlanLines, phraseKeysOf, type OwnPlan } from './plan-lines';
import { usualNightsOf } from './usual-nights';

type PreviewRequest = z.output<typeof previewIndividualPlanRequest>;

interface ChildRow {
  callMe: string;
  bornOn: Day;
  feeding: Feeding;
  travelMinutes: number;
  readyMinutes: number;
}

/** What a plan would say to this family, with everything that must be mended before it is signed; nothing is kept. */
export async function previewIndividualPlan(
  context: Context,
  actor: Actor,
  staff: StaffMember,
  childId: number,
  { body, seriesId }: PreviewRequest,
): Promise<IndividualPlanPreview> {
  const { db, clock } = context;
  const reached = await childInReach(db, staff, childId);
  const site = await siteOf(db, reached.siteId);
  const [child] = await select<ChildRow>(
    db,
    `SELECT call_me AS callMe, born_on AS bornOn, feeding, travel_minutes AS travelMinutes,
       ready_minutes AS readyMinutes
     FROM children JOIN households ON households.id = household_id WHERE children.id = :childId`,
    { childId },
  );
  if (!child) throw notFound('This child');
  await recordViewOnce(context, actor, {
    matter: 'individual-plans',
    childIds: [childId],
    at: clock.now(),
  });
  const words = clinicWords(staff.language);
  const planned = (await morningsToCome(context, reached)).find(
    (morning) => seriesId === null || morning.seriesId === seriesId,
  );
  const tomorrow = addDays(dayOf(clock.now(), site.zone), 1);
  const on = planned?.on ?? (child.bornOn > tomorrow ? child.bornOn : tomorrow);
  const arrivalAt =
    planned?.arrivalAt ?? instantOf({ on, time: site.arrivals.from, zone: site.zone });
  const shown = {
    on,
    arrivalTime: localTimeOf(arrivalAt, site.zone),
    exampleSays: planned ? null : exampleSays(words, on, site),
  };
  const problems = individualPlanProblems(body);
  if (problems.length > 0)
    return { ...shown, problems: told(words, problems), explains: [], languages: [] };
  const protocol = await currentProtocol(db, site.id, on);
  const plan = individualPlanOf(body, 0, {
    arrivalAt,
    zone: site.zone,
    ageMonths: ageOn(child.bornOn, on).months,
    feeding: child.feeding,
    travelMinutes: child.travelMinutes,
    readyMinutes: child.readyMinutes,
    usualWaitMinutes: site.usualWaitMinutes,
    eatAgainAfterMinutes: protocol.eatAgainAfterMinutes,
    protocolVersion: protocol.version,
    usual: (await usualNightsOf(db, [childId])).get(childId),
  });
  const own: OwnPlan = { callMe: child.callMe, site, zone: site.zone, plan, body };
  return {
    ...shown,
    problems: told(words, morningProblems(plan)),
    explains: fastingPlanSays(words, plan, {
      zone: site.zone,
      signer: '',
      source: protocol.says,
    }),
    languages: await languagesOf(context, childId, own, child.feeding, words),
  };
}

const told = (
  words: ClinicWords,
  problems: readonly { readonly path: string; readonly message: string }[],
): IndividualPlanPreview['problems'] =>
  problems.map(({ path, message }) => ({ path, message: words.sentence(message) }));

const exampleSays = (words: ClinicWords, on: Day, site: Site): string =>
  words.text('clinic.own-plan.no-morning', { day: words.day(on), time: site.arrivals.from });

function languageName(language: string, words: ClinicWords): string {
  if (!isLanguageId(language)) return language;
  const { englishName } = languageOf(language);
  if (words.language === 'en') return englishName;
  return new Intl.DisplayNames([words.language], { type: 'language' }).of(language) ?? englishName;
}

/** Each language that somebody in the family reads; without signed phrases a person calls. */
async function languagesOf(
  { db }: Context,
  childId: number,
  own: OwnPlan,
  feeding: Feeding,
  words: ClinicWords,
): Promise<IndividualPlanPreview['languages']> {
  const rows = await select<{ language: string }>(
    db,
    `SELECT DISTINCT reads_language AS language FROM family_members
     JOIN child_family_members ON family_member_id = family_members.id
     WHERE child_id = :childId ORDER BY reads_language`,
    { childId },
  );
  const keys = phraseKeysOf(own.body);
  const found: IndividualPlanPreview['languages'] = [];
  for (const { language } of rows) {
    const name = languageName(language, words);
    if (!canSpeak(language) || !isLanguageId(language)) {
      const says = words.text('clinic.own-plan.unsigned-words', {
        language: name,
        count: keys.length,
      });
      found.push({ language, dir: 'ltr', isSigned: false, says, lines: [] });
      continue;
    }
    const wording = await loadWording(db, language);
    const isSigned = arePhrasesSigned(own.body, wording);
    const count = keys.filter((key) => !wording.isSignedOff([key])).length;
    found.push({
      language,
      dir: wording.dir,
      isSigned,
      says: isSigned
        ? words.text('clinic.own-plan.signed-words', { language: name })
        : words.text('clinic.own-plan.unsigned-words', { language: name, count }),
      // A language without these texts yet has nothing to show; its families are called.
      lines: wording.has('own-plan.line')
        ? ownPlanLines(own, feeding, wordsFrom(wording, own.zone))
        : [],
    });
  }
  return found;
}
