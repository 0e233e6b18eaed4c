import type { FamilySession } from '../../shared/contracts/family-session';
import { dayOf } from '../../shared/domain/zone';
import type { Context } from '../context';
import { select } from '../database/connection';
import { Problem } from '../http/problem';
import { siteOf } from '../sites/sites';
import type { Wording } from '../wording/render';
import { clinicForFamily, wordingFor } from './clinic-for-family';
import { familyStanding, reachOf } from './family-visitors';
import type { FamilyStanding } from './family-visitors';
import { builtLanguages } from '../../shared/languages/languages';

export interface OpenFamilySession {
  readonly familyMemberId: number;
  readonly isRemembered: boolean;
  /** Real clock, epoch milliseconds. */
  readonly freshUntil: number | null;
}

/** After the last arrival plus this, the morning's question is over. */
const afterArrivalMs = 2 * 3_600_000;

/** What the family's application learns about its own session. @throws Problem 401 when the member is gone. */
export async function describeFamilySession(
  context: Context,
  session: OpenFamilySession,
): Promise<FamilySession> {
  const member = await familyStanding(context.db, session.familyMemberId);
  if (!member) throw new Problem(401, 'not-signed-in', 'Open the link from the clinic again.');
  const reach = reachOf(member.standing, session.freshUntil);
  const wording = await wordingFor(context, member.language);
  return {
    reach,
    isRemembered: session.isRemembered,
    freshUntil:
      reach === 'fresh' && session.freshUntil !== null
        ? new Date(session.freshUntil).toISOString()
        : null,
    standing: member.standing,
    language: isBuilt(member.language) ? member.language : 'en',
    maySeeLetters: member.standing === 'guardian' && member.seesResults,
    codeGoesTo: codeGoesTo(member, wording),
    clinic: await clinicForFamily(context, member.siteId, member.language),
    now: new Date(context.clock.now()).toISOString(),
    opens: await whatOpens(context, member),
  };
}

/** Where a code would go, shortened so that a borrowed phone learns no address. */
export function codeGoesTo(
  member: Pick<FamilyStanding, 'phone' | 'email' | 'standing'>,
  wording: Wording | null,
): FamilySession['codeGoesTo'] {
  if (member.standing === 'helper') return [];
  const say = (channel: 'sms' | 'mail', address: string): string =>
    wording?.has(`code.goes-to.${channel}`)
      ? wording.text(`code.goes-to.${channel}`, { address })
      : address;
  return [
    ...(member.phone
      ? [{ channel: 'sms' as const, says: say('sms', `…${member.phone.slice(-4)}`) }]
      : []),
    ...(member.email
      ? [{ channel: 'mail' as const, says: say('mail', shortMail(member.email)) }]
      : []),
  ];
}

function shortMail(email: string): string {
  const [name = '', domain = ''] = email.split('@');
  return `${name.slice(0, 1)}…@${domain}`;
}

/** The morning question from the moment it is asked until two hours after arrival; else the home page. */
async function whatOpens(
  context: Context,
  member: FamilyStanding,
): Promise<FamilySession['opens']> {
  const now = context.clock.now();
  const site = await siteOf(context.db, member.siteId);
  const [row] = await select<{ id: number }>(
    context.db,
    `SELECT m.id FROM mornings m JOIN children c ON c.id = m.child_id
     WHERE c.household_id = :householdId AND m.planned_on = :today AND m.state = 'planned'
       AND m.arrival_at <= :askedUntil AND m.arrival_at > :overSince
     LIMIT 1`,
    {
      householdId: member.householdId,
      today: dayOf(now, site.zone),
      askedUntil: new Date(now + site.morningQuestionMinutesBefore * 60_000),
      overSince: new Date(now - afterArrivalMs),
    },
  );
  return row ? 'morning-question' : 'next-morning';
}

/** The pages come in the person's language, or in English with every text still held to its own sign-off. */
const isBuilt = (language: string): boolean => builtLanguages.some(({ id }) => id === language);
