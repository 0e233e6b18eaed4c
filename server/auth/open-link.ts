import type { Request } from 'express';
import type { Transaction } from 'sequelize';
import type { z } from 'zod';
import type { LinkDescription, openLinkRequest } from '../../shared/contracts/family-session';
import { builtLanguages } from '../../shared/languages/languages';
import { record, systemActor } from '../access-record/record';
import type { Actor } from '../access-record/record';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { Problem } from '../http/problem';
import { clinicForFamily } from './clinic-for-family';
import { callAboutLockedLink } from './locked-link';
import { linkOf, linkTries, stateOf } from './links';
import type { FamilyLink, LinkState } from './links';
import { rememberedPhoneOf } from './remembered-phones';

const clocks = (context: Context) => ({
  businessNow: context.clock.now(),
  realNow: Date.now(),
});

/** The link's own phone: remembered for the same family member, so that nobody else's link opens on it. */
async function isOwnPhone(
  context: Context,
  req: Request,
  link: FamilyLink,
  transaction?: Transaction,
): Promise<boolean> {
  const phone = await rememberedPhoneOf(context.db, req, transaction);
  return link.kind === 'household' && phone?.familyMemberId === link.familyMemberId;
}

/** The language of the page that asks, where nobody is known yet whose own it could be. */
const pageLanguage = (req: Request): string =>
  req.acceptsLanguages(...builtLanguages.map(({ id }) => id)) || 'en';

/** What a link is for and whether it is open. Uses nothing up and says nothing about a child. */
export async function describeLink(
  context: Context,
  req: Request,
  token: string,
): Promise<LinkDescription> {
  const link = await linkOf(context.db, token);
  if (!link)
    return {
      kind: 'invitation',
      state: 'unknown',
      needs: 'birth-date',
      clinic: await clinicForFamily(context, null, pageLanguage(req)),
    };
  return {
    kind: link.kind,
    state: stateOf(link, clocks(context)),
    needs: (await isOwnPhone(context, req, link)) ? 'nothing' : 'birth-date',
    clinic: await clinicForFamily(context, link.siteId, link.language),
  };
}

type Outcome =
  | { readonly kind: 'open'; readonly familyMemberId: number }
  | { readonly kind: Exclude<LinkState, 'open'> | 'unknown' }
  | { readonly kind: 'wrong'; readonly triesLeft: number };

const over: Readonly<Record<Exclude<LinkState, 'open'> | 'unknown', () => Problem>> = {
  unknown: () => new Problem(404, 'link-unknown', 'We do not know this link. Call us.'),
  expired: () => new Problem(410, 'link-expired', 'This link is over. Call us for a new one.'),
  used: () => new Problem(410, 'link-used', 'This link was opened before. Call us for a new one.'),
  locked: () => new Problem(423, 'link-locked', 'There were too many tries. We call you.'),
};

/**
 * The second step of a link: the birth date of any child of the household, or the remembered phone. An invitation is
 * used up here and never by looking; a household link stays open until its morning is over. Every try is counted before
 * it is judged, under a lock, so that five are five however many come at once.
 * @returns the family member who is now here.
 * @throws Problem 404, 410, 423 by the link's state, 422 'birth-date-wrong' with `triesLeft`.
 */
export async function openLink(
  context: Context,
  req: Request,
  request: z.output<typeof openLinkRequest>,
): Promise<number> {
  const outcome = await inTransaction(context.db, (transaction) =>
    tryLink(context, transaction, req, request),
  );
  if (outcome.kind === 'open') return outcome.familyMemberId;
  if (outcome.kind !== 'wrong') throw over[outcome.kind]();
  const message = 'This is not a birth date of a child of your family. Look at it again.';
  throw new Problem(422, 'birth-date-wrong', message, {
    errors: [{ path: 'bornOn', message }],
    triesLeft: outcome.triesLeft,
  });
}

async function tryLink(
  context: Context,
  transaction: Transaction,
  req: Request,
  { token, bornOn }: z.output<typeof openLinkRequest>,
): Promise<Outcome> {
  const { db } = context;
  const link = await linkOf(db, token, transaction);
  if (!link) return { kind: 'unknown' };
  const state = stateOf(link, clocks(context));
  if (state !== 'open') return { kind: state };
  const children = await select<{ id: number; born_on: string }>(
    db,
    'SELECT id, born_on FROM children WHERE household_id = :householdId',
    { householdId: link.householdId },
    transaction,
  );
  const childIds = children.map(({ id }) => id);
  const isRight =
    (await isOwnPhone(context, req, link, transaction)) ||
    children.some(({ born_on }) => bornOn !== null && born_on === bornOn);
  if (isRight) {
    await useLink(context, transaction, link);
    await record(db, transaction, await linkActor(context, transaction, link, req), {
      action: 'changed',
      matter: 'family-sign-in',
      childIds,
      detail: { by: link.kind },
      at: context.clock.now(),
    });
    return { kind: 'open', familyMemberId: link.familyMemberId };
  }
  const tries = link.tries + 1;
  await change(
    db,
    'UPDATE family_links SET tries = :tries WHERE id = :id',
    { tries, id: link.id },
    transaction,
  );
  if (tries < linkTries) return { kind: 'wrong', triesLeft: linkTries - tries };
  await record(db, transaction, systemActor('links'), {
    action: 'changed',
    matter: 'link-locked',
    childIds,
    detail: { linkId: link.id },
    at: context.clock.now(),
  });
  await callAboutLockedLink(context, transaction, link);
  return { kind: 'locked' };
}

async function useLink({ db }: Context, transaction: Transaction, link: FamilyLink): Promise<void> {
  const sets = link.kind === 'invitation' ? 'used_at = :now, tries = 0' : 'tries = 0';
  await change(
    db,
    `UPDATE family_links SET ${sets} WHERE id = :id`,
    { id: link.id, now: new Date() },
    transaction,
  );
}

async function linkActor(
  { db }: Context,
  transaction: Transaction,
  link: FamilyLink,
  req: Request,
): Promise<Actor> {
  const [member] = await select<{ full_name: string }>(
    db,
    'SELECT full_name FROM family_members WHERE id = :id',
    { id: link.familyMemberId },
    transaction,
  );
  return {
    side: 'family',
    id: link.familyMemberId,
    name: member?.full_name ?? '',
    sessionHash: null,
    address: req.ip ?? null,
  };
}
