// One run: opens the house, lets the families live through the days, and hands everything to the book-keeper.
import { dayAfter, instantAt, weekdayOf, BusinessClock } from './business-clock.mjs';
import { openClinic } from './clinic.mjs';
import { planClosings } from './closings.mjs';
import { openHouse } from './house.mjs';
import { Ledger } from './ledger.mjs';
import { Life } from './life.mjs';
import { Receipts } from './receipts.mjs';
import { Refused } from './requests.mjs';
import { writeScript } from './script.mjs';
import { Timeline } from './timeline.mjs';
import { Troubles } from './troubles.mjs';

/** Minutes of the day: before dawn, after the evening texts, late. */
const looksAtCalls = [3 * 60 + 30, 19 * 60 + 30, 21 * 60 + 30];

/** The last family comes early enough for its mornings. */
const daysForMornings = 5;

/**
 * @param start Monday on which the run begins, 'YYYY-MM-DD'
 * @returns what the book-keeper needs, and the tally of the run
 */
export async function runDays({ families, days, seed, faults, start, progress = () => undefined }) {
  const house = await openHouse();
  let clock;
  try {
    const tally = newTally();
    const { origin, environment } = house;
    const control = `http://127.0.0.1:${environment.THREEDAWN_STAND_IN_CONTROL_PORT}`;
    const clinic = await openClinic({ origin, tally });
    const { site } = await clinic.nurse.get('/api/clinic/set-up');
    const { zone } = site;
    clock = new BusinessClock({
      databaseUrl: environment.THREEDAWN_DATABASE_URL,
      staff: clinic.nurse,
    });
    const dayAt = (index) => dayAfter(start, index);
    const ledger = new Ledger(clock);
    const receipts = new Receipts(house.receiptFile);
    const timeline = new Timeline();
    const run = { house, clinic, control, origin, site, zone, tally, clock, dayAt, ledger };
    Object.assign(run, { receipts, timeline, lastDay: dayAt(days), days: [] });
    const clinicDays = Array.from({ length: days }, (_, index) => index).filter(
      (index) => weekdayOf(dayAt(index)) <= 5 && index < Math.max(1, days - daysForMornings),
    );
    for (const family of writeScript({ families, seed, clinicDays })) new Life(run, family).begin();
    if (faults) new Troubles(run, seed).begin(days);
    planClosings(run, days, seed);
    for (let day = 0; day < days; day += 1) {
      timeline.add(instantAt(dayAt(day), 13 * 60, zone), () => worksOffCalls(run));
      // Tasks that an answer makes needless leave the list again: somebody looks now and then.
      for (const look of looksAtCalls)
        timeline.add(instantAt(dayAt(day), look, zone), async () =>
          ledger.noteCalls(await clinic.nurse.get('/api/clinic/calls')),
        );
      timeline.add(instantAt(dayAt(day), 9 * 60, zone), () => {
        progress(day);
        return Promise.resolve();
      });
    }
    const endAt = instantAt(dayAt(days), 12 * 60, zone);
    await clock.goTo(instantAt(start, 8 * 60, zone));
    await live(run, endAt);
    return await closeBooks(run, endAt);
  } catch (error) {
    error.message += ` (logs: ${house.logFolder})`;
    throw error;
  } finally {
    await clock?.close();
    await house.close();
  }
}

const newTally = () => ({
  families: 0,
  familiesWithoutPlace: 0,
  mornings: 0,
  closings: 0,
  answersByPage: 0,
  answersByText: 0,
  repeatedTexts: 0,
  requests: 0,
  repeatedRequests: 0,
  steps: 0,
  settleMs: 0,
  falls: {},
  refused: [],
});

/** From due moment to due moment: what the outbox waits for next, or what somebody does next. */
async function live(run, endAt) {
  const { clock, timeline, tally } = run;
  for (;;) {
    tally.settleMs += await settle(run, Math.min(timeline.nextAt ?? Infinity, endAt));
    const due = await clock.nextDueAt();
    const next = Math.min(timeline.nextAt ?? Infinity, due ?? Infinity, endAt);
    if (next >= endAt && clock.now() >= endAt) return;
    await clock.goTo(next);
    tally.steps += 1;
    while (timeline.nextAt !== null && timeline.nextAt <= clock.now()) await timeline.take().run();
  }
}

/** Lets everything end that takes seconds in life as well: sending, arriving, the reports of it. */
async function settle({ clock, receipts }, to) {
  const begun = performance.now();
  await clock.settled({ to });
  await receipts.allArrived();
  if (receipts.notDelivered.length > 0) await clock.hasHeard(receipts.notDelivered.splice(0));
  return performance.now() - begun;
}

/** Staff look at the call list every day and make the calls. */
async function worksOffCalls({ clinic, ledger, tally }) {
  const list = await clinic.clinician.get('/api/clinic/calls');
  ledger.noteCalls(list);
  for (const { id } of list.open) {
    try {
      await clinic.clinician.post(`/api/clinic/calls/${id}/outcome`, {
        outcome: 'reached',
        interpreter: 'I-77',
        note: 'Spoke with the family.',
      });
    } catch (error) {
      if (!(error instanceof Refused)) throw error;
      tally.refused.push(error.message);
    }
  }
}

async function closeBooks(run, endAt) {
  const { clock, clinic, ledger, receipts, site, tally, control } = run;
  tally.settleMs += await clock.settled();
  ledger.noteCalls(await clinic.clinician.get('/api/clinic/calls'));
  const states = new Map();
  for (const { children } of ledger.lines.filter(({ what }) => what === 'household'))
    for (const { id } of children) {
      const record = await clinic.nurse.get(`/api/clinic/children/${id}`);
      for (const { mornings } of record.series)
        for (const morning of mornings) states.set(morning.id, morning.state);
    }
  // Which text was meant as what: no page of the clinic says that with the provider's number.
  const labels = await clock.rows(
    `SELECT id, provider_id AS providerId, kind, channel, address, household_id AS household,
       staff_id AS staff, morning_on AS morningOn, state FROM messages
     WHERE household_id IS NOT NULL OR staff_id IS NOT NULL`,
  );
  receipts.read();
  const { done: faultsDone } = await (await fetch(`${control}/faults`)).json();
  return {
    books: {
      site,
      lines: ledger.lines,
      calls: ledger.calls,
      states,
      labels: labels.map((row) => ({ ...row, morningOn: dayText(row.morningOn) })),
      texts: receipts.texts,
      mails: receipts.mails,
      endAt,
    },
    tally: { ...tally, faultsDone, repliesIn: receipts.texts.filter(isIn).length },
  };
}

const isIn = ({ direction }) => direction === 'in';
const dayText = (value) => (value instanceof Date ? value.toISOString().slice(0, 10) : value);
