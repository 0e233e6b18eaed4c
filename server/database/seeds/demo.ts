import { builtLanguages } from '../../../shared/languages/languages';
import { record, systemActor } from '../../access-record/record';
import type { Context } from '../../context';
import { sendCalendarEntries } from '../../messages/calendar-entries';
import { sendInvitation } from '../../messages/invite';
import { planHouseholdMessages } from '../../messages/plan-messages';
import { seedWording } from '../../wording/seed-wording';
import { inTransaction, select } from '../connection';
import { seedFamily, type SeededChild } from './demo-chain';
import { demoSiteName, seedDemoClinic } from './demo-clinic';
import { demoFamilies } from './demo-families';

/**
 * The demo clinic with its invented people, once: five children come on the next morning, others wait for a plan, for
 * cultures or for a letter. What families hear of it is queued like any other message.
 * @returns false when it was there already
 */
export async function seedDemo(context: Context): Promise<boolean> {
  const { db, clock } = context;
  const now = clock.now();
  const seeded = await inTransaction(db, async (transaction) => {
    await select(db, "SELECT GET_LOCK('threedawn-seed', 60) AS got", {}, transaction);
    try {
      const known = await select(
        db,
        'SELECT id FROM sites WHERE name = :demoSiteName',
        { demoSiteName },
        transaction,
      );
      if (known.length > 0) return null;
      const clinic = await seedDemoClinic(db, transaction, now);
      const signedBy = { staffId: clinic.staffIds.get('okafor') ?? 0, at: now };
      for (const { id: language } of builtLanguages)
        await seedWording(db, { language, signedBy, now }, transaction);
      const children: SeededChild[] = [];
      for (const family of demoFamilies)
        children.push(...(await seedFamily(context, transaction, clinic, family)));
      await tellFamilies(context, transaction, children);
      await record(db, transaction, systemActor('demo clinic'), {
        action: 'changed',
        matter: 'demo-clinic',
        childIds: children.map(({ childId }) => childId),
        at: now,
      });
      return children;
    } finally {
      await select(db, "SELECT RELEASE_LOCK('threedawn-seed') AS freed", {}, transaction);
    }
  });
  if (!seeded) return false;
  const coming = seeded.filter(({ toCome }) => toCome.length > 0);
  for (const familyMemberId of new Set(coming.flatMap((child) => child.familyMemberIds)))
    await sendInvitation(context, systemActor('demo clinic'), familyMemberId);
  return true;
}

async function tellFamilies(
  context: Context,
  transaction: Parameters<typeof sendCalendarEntries>[1],
  children: readonly SeededChild[],
): Promise<void> {
  const nights = new Map(
    children.flatMap(({ householdId, toCome }) =>
      toCome.map(({ on }) => [`${householdId}:${on}`, { householdId, on }] as const),
    ),
  );
  for (const night of nights.values()) await planHouseholdMessages(context, transaction, night);
  const morningIds = children.flatMap(({ toCome }) => toCome.map(({ morningId }) => morningId));
  await sendCalendarEntries(context, transaction, morningIds, 'REQUEST');
}
