import type { OnCallList, SaveOnCallRequest } from '../../shared/contracts/alerts';
import { isClinicLanguage } from '../../shared/languages/clinic-languages';
import { record, type Actor } from '../access-record/record';
import type { StaffMember } from '../auth/current-user';
import { internationalPhone } from '../children/contact-details';
import type { Context } from '../context';
import { change, inTransaction, select } from '../database/connection';
import { changedMeanwhile, invalid, type FieldError } from '../http/problem';
import { siteOf, sitesOf } from '../sites/sites';
import { activeStaff, peopleToTell, turnsOf, type AlertPerson } from './alert-people';

/** The on-call list of a site, by default the own one, with everybody who may stand on it. @throws Problem 404 */
export async function readOnCall(
  { db, clock }: Context,
  staff: StaffMember,
  siteId = staff.siteId,
): Promise<OnCallList> {
  const site = await siteOf(db, siteId);
  const [sites, turns, people, now, [kept]] = await Promise.all([
    sitesOf(db),
    turnsOf(db, siteId),
    activeStaff(db),
    peopleToTell(db, site, clock.now()),
    select<{ alert_wait_minutes: number; on_call_version: number }>(
      db,
      'SELECT alert_wait_minutes, on_call_version FROM sites WHERE id = :siteId',
      { siteId },
    ),
  ]);
  return {
    sites: sites.map(({ id, name }) => ({ id, name })),
    site: { id: site.id, name: site.name, zone: site.zone },
    waitMinutes: kept?.alert_wait_minutes ?? 0,
    version: kept?.on_call_version ?? 1,
    turns: turns.map((turn) => ({ ...turn, weekdays: [...turn.weekdays] })),
    staff: people.map(({ id, fullName, email, phone, byText, byMail, language }) => ({
      id,
      fullName,
      email,
      phone,
      byText,
      byMail,
      language: isClinicLanguage(language) ? language : 'en',
    })),
    now: now.map(({ fullName }) => fullName),
    isEmpty: turns.length === 0,
  };
}

/**
 * Keeps the whole list anew, and how each one on it is reached.
 * @throws Problem 422, 404, 409 'changed-meanwhile'
 */
export async function saveOnCall(
  { db, clock }: Context,
  actor: Actor,
  siteId: number,
  { version, waitMinutes, turns, reach }: SaveOnCallRequest,
): Promise<void> {
  await inTransaction(db, async (transaction) => {
    const site = await siteOf(db, siteId, transaction);
    const staff = await activeStaff(db, transaction);
    const { people, errors } = checkedReach(reach, staff, site.country);
    errors.push(...turnFaults(turns, staff));
    if (errors.length > 0) throw invalid(errors);
    const kept = await change(
      db,
      `UPDATE sites SET alert_wait_minutes = :waitMinutes, on_call_version = on_call_version + 1
       WHERE id = :siteId AND on_call_version = :version`,
      { siteId, waitMinutes, version },
      transaction,
    );
    if (kept === 0) throw changedMeanwhile();
    await change(db, 'DELETE FROM on_call_turns WHERE site_id = :siteId', { siteId }, transaction);
    for (const turn of turns)
      await db.query(
        `INSERT INTO on_call_turns (site_id, staff_id, deputy_staff_id, weekdays, from_time, until_time, from_on, until_on)
         VALUES (:siteId, :staffId, :deputyId, :weekdays, :from, :until, :fromOn, :untilOn)`,
        {
          replacements: {
            ...turn,
            siteId,
            weekdays: JSON.stringify([...new Set(turn.weekdays)].sort()),
          },
          transaction,
        },
      );
    for (const person of people)
      await change(
        db,
        `UPDATE staff SET phone = :phone, alerts_by_text = :byText, alerts_by_mail = :byMail,
           alerts_language = :language WHERE id = :staffId`,
        { ...person },
        transaction,
      );
    await record(db, transaction, actor, {
      action: 'changed',
      matter: 'on-call-list',
      childIds: [],
      detail: {
        siteId,
        waitMinutes,
        turns: turns.map(({ staffId, deputyId }) => ({ staffId, deputyId })),
        reach: people.map(({ staffId }) => staffId),
      },
      at: clock.now(),
    });
  });
}

type Reach = SaveOnCallRequest['reach'][number];

function checkedReach(
  reach: readonly Reach[],
  staff: readonly AlertPerson[],
  country: string,
): { readonly people: Reach[]; readonly errors: FieldError[] } {
  const errors: FieldError[] = [];
  const people = reach.map((person, index) => {
    const at = `reach.${index}`;
    const phone = person.phone === null ? null : internationalPhone(person.phone, country);
    if (!staff.some(({ id }) => id === person.staffId))
      errors.push({ path: at, message: 'This account is not in use.' });
    if (person.phone !== null && phone === null)
      errors.push({
        path: `${at}.phone`,
        message: 'This number is too short, too long or lacks its area code.',
      });
    if (person.byText && person.phone === null)
      errors.push({ path: `${at}.phone`, message: 'Texts need a telephone number.' });
    if (!person.byText && !person.byMail)
      errors.push({ path: `${at}.byMail`, message: 'Choose a text, an e-mail or both.' });
    return { ...person, phone };
  });
  return { people, errors };
}

function turnFaults(
  turns: SaveOnCallRequest['turns'],
  staff: readonly AlertPerson[],
): FieldError[] {
  const isActive = (id: number): boolean => staff.some((one) => one.id === id);
  return turns.flatMap((turn, index) => {
    const at = `turns.${index}`;
    const errors: FieldError[] = [];
    if (!isActive(turn.staffId))
      errors.push({ path: `${at}.staffId`, message: 'This account is not in use.' });
    if (turn.deputyId !== null && !isActive(turn.deputyId))
      errors.push({ path: `${at}.deputyId`, message: 'This account is not in use.' });
    if (turn.deputyId === turn.staffId)
      errors.push({ path: `${at}.deputyId`, message: 'The deputy is somebody else.' });
    if (turn.untilOn !== null && turn.untilOn < turn.fromOn)
      errors.push({ path: `${at}.untilOn`, message: 'This ends before it begins.' });
    return errors;
  });
}
