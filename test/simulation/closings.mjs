// Some mornings the whole clinic stays closed, and somebody says so from a telephone at four.
import { instantAt } from './business-clock.mjs';
import { chanceOf, dealer } from './chance.mjs';

const fourOClock = 4 * 60;

export function planClosings({ timeline, dayAt, zone, days, clinic, ledger, tally }, count, seed) {
  const deal = dealer(chanceOf(seed, 'closings'), { open: 11, closed: 1 });
  for (let index = 0; index < count; index += 1) {
    if (deal() === 'open') continue;
    const on = dayAt(index);
    timeline.add(instantAt(on, fourOClock, zone), async () => {
      const those = days.filter((day) => day.on === on && day.script.doing !== 'called-off');
      if (those.length === 0) return;
      for (const day of those) {
        day.isClosed = true;
        for (const { morningId } of day.children)
          ledger.note('lost', { household: day.household, on, morningId, isClosed: true });
      }
      tally.closings += 1;
      await clinic.nurse.post(`/api/clinic/closings/${on}`, { reason: 'snow', says: null });
    });
  }
}
