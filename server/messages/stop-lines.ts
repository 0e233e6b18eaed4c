import { stopGroups } from '../../shared/domain/fasting-stops';
import type { MorningPlan } from '../series/morning-plans';
import { stopTimeSays, type NotedWording } from './draft-message';

/**
 * When a child may have nothing more: one line where everything ends together, one for each time where things have
 * hours of their own, and "as we told you" where nobody has composed a plan yet.
 */
export function stopLines(
  noted: NotedWording,
  { plan, familyLabel: label, zone }: MorningPlan,
  key: 'message.evening.line' | 'message.morning.line' | 'message.reminder.line',
): string {
  if (plan.kind === 'individual') return noted.text(`${key}-individual`, { label });
  if (plan.allSame) return noted.text(key, { label, time: stopTimeSays(noted, plan.stopAt, zone) });
  return stopGroups(plan.stops)
    .map(({ stopAt, items }) =>
      noted.text(`${key}-items`, {
        label,
        things: listed(
          noted,
          items.map((item) => noted.text(`item.${item}`)),
        ),
        time: stopTimeSays(noted, stopAt, zone),
      }),
    )
    .join('\n');
}

/** As `wording.list`, noting the texts that it uses. */
function listed(noted: NotedWording, names: readonly string[]): string {
  const [first = '', second, ...more] = names;
  if (second === undefined) return first;
  if (more.length === 0) return noted.text('list.two', { first, second });
  return noted.text('list.more', { first, rest: listed(noted, [second, ...more]) });
}
