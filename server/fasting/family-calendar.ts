import type { FamilyCalendar } from '../../shared/contracts/family-morning';
import { familyDay } from '../../shared/languages/family-time';
import { recordViewOnce } from '../access-record/record-view-once';
import type { Actor } from '../access-record/record';
import type { FamilyVisitor } from '../auth/current-user';
import type { Context } from '../context';
import { calendarDownload, type CalendarEntry } from '../outbox/calendar-file';
import { siteOf } from '../sites/sites';
import { shownPhone } from '../messages/shown-phone';
import { familyWords, type FamilyWords } from './family-words';
import { householdOf, standardPlanOf, type Household } from './household-night';

const minute = 60_000;
/** How long a visit is in a calendar: arrival, wait, collection, breakfast. */
const visitMinutes = 90;

async function householdWords(
  context: Context,
  actor: Actor,
  visitor: FamilyVisitor,
): Promise<{ household: Household; words: FamilyWords }> {
  const now = context.clock.now();
  const household = await householdOf(context.db, visitor, now);
  const [first] = household.mornings;
  const site = first ? await siteOf(context.db, first.siteId) : null;
  const words = await familyWords(context, visitor.language, site);
  await recordViewOnce(context, actor, {
    matter: 'family-calendar',
    childIds: [...new Set(household.mornings.map(({ childId }) => childId))],
    at: now,
  });
  return { household, words };
}

export async function familyCalendarOf(
  context: Context,
  actor: Actor,
  visitor: FamilyVisitor,
): Promise<FamilyCalendar> {
  const { household, words } = await householdWords(context, actor, visitor);
  return {
    mornings: household.mornings.map((plan) => {
      const isCancelled = plan.state === 'lost';
      const says = words.text(isCancelled ? 'calendar.row-lost' : 'calendar.row', {
        name: plan.callMe,
        number: plan.number,
        total: plan.ofPlanned,
        dayText: familyDay(plan.on, words.wording.profile).text,
      });
      const arrives = words.text('calendar.arrives', {
        door: plan.site.door,
        time: words.time(plan.arrivalAt),
      });
      return { morningId: plan.morningId, says, arrives, isCancelled };
    }),
    downloadSays: words.text('calendar.download'),
  };
}

/** The file to download: one neutral entry a morning of the household; brothers and sisters share it. */
export async function familyCalendarFile(
  context: Context,
  actor: Actor,
  visitor: FamilyVisitor,
): Promise<string> {
  const { household, words } = await householdWords(context, actor, visitor);
  const entries = calendarEntriesOf(household, words, context.settings.origin);
  return calendarDownload({ entries, stampAt: context.clock.now() });
}

/** One neutral entry a morning of the household; brothers and sisters share it. */
export function calendarEntriesOf(
  household: Household,
  words: FamilyWords,
  origin: string,
): CalendarEntry[] {
  return household.nights.flatMap(({ children, firstArrivalAt }): CalendarEntry[] => {
    const [plan] = [...children].sort((left, right) => left.arrivalAt - right.arrivalAt);
    if (!plan) return [];
    const stops = children.flatMap((child) => standardPlanOf(child)?.stopReminderAt ?? []);
    return [
      {
        uid: plan.calendarUid,
        sequence: plan.calendarSequence,
        title: words.text('calendar.title'),
        description: words.text('calendar.description', {
          phone: shownPhone(plan.site.phone, plan.site.country),
          url: origin,
        }),
        location: `${plan.site.name}, ${plan.site.address}`,
        startAt: firstArrivalAt,
        endAt: firstArrivalAt + visitMinutes * minute,
        alarmAt: stops.length > 0 ? Math.min(...stops) : null,
        language: words.wording.language,
      },
    ];
  });
}
