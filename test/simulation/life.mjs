// What happens to one family of a run, from the day it is enrolled to its last morning.
import { dayAfter, instantAt, minuteOf } from './business-clock.mjs';
import { collect, enrol, plan } from './clinic.mjs';
import { FamilyHome } from './family-phone.mjs';
import { doOnMorning, tellByText } from './morning-doings.mjs';
import { Refused } from './requests.mjs';

const minute = 60_000;
const callsWithinMs = 6_000;

export class Life {
  constructor(run, family) {
    Object.assign(this, { run, family });
    const { origin, control, receipts, tally } = run;
    this.home = new FamilyHome({ family, origin, control, receipts, tally });
  }

  /** Adds to the timeline what this family does by itself. */
  begin() {
    const { zone, dayAt } = this.run;
    const { enrolsOn, enrolsMinute } = this.family;
    this.#at(instantAt(dayAt(enrolsOn), enrolsMinute, zone), () => this.#enrols());
  }

  #at(instant, work) {
    const { timeline, tally } = this.run;
    timeline.add(instant, () =>
      work().catch((error) => {
        if (!(error instanceof Refused)) throw error;
        tally.refused.push(`family ${this.family.number}: ${error.message}`);
      }),
    );
  }

  async #enrols() {
    const { clinic, clock, dayAt, ledger, tally, lastDay } = this.run;
    const { family } = this;
    const today = dayAt(family.enrolsOn);
    const bornOn = ({ ageDays }) => dayAfter(today, -ageDays);
    const now = () => clock.now();
    this.enrolled = await enrol(clinic, family, { today, bornOn, now });
    const { householdId, children, members } = this.enrolled;
    ledger.note('household', {
      household: householdId,
      family: family.number,
      adults: family.adults.map((adult) => ({
        ...adult,
        id: members.find(({ fullName }) => fullName === adult.fullName).id,
      })),
      children: children.map((child) => ({
        id: child.id,
        fullName: child.fullName,
        bornOn: child.bornOn,
      })),
    });
    const days = await plan(clinic, family, this.enrolled, {
      from: today,
      before: lastDay,
    });
    const guardian = members.find(({ standing }) => standing === 'guardian');
    ledger.note('invited', { household: householdId, familyMemberId: guardian.id });
    await clinic.nurse.post(`/api/clinic/family-members/${guardian.id}/invitations`);
    if (!days) {
      tally.familiesWithoutPlace += 1;
      return;
    }
    tally.families += 1;
    days.forEach((day, index) => this.#plansDay(day, family.mornings[index]));
    this.#plansOptOut(days);
    this.#plansConsent(days);
  }

  #plansDay(planned, script) {
    const { clock, ledger, zone, site, tally } = this.run;
    const { householdId } = this.enrolled;
    const children = planned.children.map((child) => ({
      ...child,
      arrivalAt: instantAt(planned.on, minuteOf(child.arrivalTime), zone),
    }));
    const firstArrivalAt = Math.min(...children.map(({ arrivalAt }) => arrivalAt));
    const day = {
      ...planned,
      household: householdId,
      script,
      children,
      firstArrivalAt,
      eveningAt: instantAt(dayAfter(planned.on, -1), minuteOf(site.eveningTextTime), zone),
      questionAt: firstArrivalAt - site.morningQuestionMinutesBefore * minute,
      callListAt: firstArrivalAt - site.callListMinutesBefore * minute,
    };
    tally.mornings += children.length;
    this.run.days.push(day);
    ledger.note('planned', {
      household: householdId,
      on: day.on,
      escortId: day.escortId,
      children: children.map(({ childId, morningId, arrivalAt }) => ({
        childId,
        morningId,
        arrivalAt,
      })),
    });
    if (script.doing === 'called-off') {
      this.#at(Math.max(day.eveningAt - 210 * minute, clock.now() + minute), () =>
        this.#callsOff(day),
      );
      return;
    }
    this.#at(day.eveningAt + 61 * minute, () => this.#evening(day));
    this.#at(day.questionAt + script.afterMinutes * minute, () => this.#morning(day));
    this.#at(day.callListAt + minute, () => this.#looksAtCalls(day));
    this.#at(firstArrivalAt - minute, () => this.#noteCalls());
    for (const child of children) this.#at(child.arrivalAt + minute, () => this.#comes(day, child));
    this.#at(firstArrivalAt + 100 * minute, () => this.#givesUp(day));
  }

  async #evening(day) {
    if (day.script.doing === 'too-early') await tellByText(this, day, '1');
  }

  async #morning(day) {
    if (!day.isClosed) await doOnMorning(this, day);
  }

  async #noteCalls() {
    const { clinic, ledger } = this.run;
    ledger.noteCalls(await clinic.nurse.get('/api/clinic/calls'));
  }

  /** Nobody has heard from this family: somebody must be told to call. Waits as long as the sender may take. */
  async #looksAtCalls(day) {
    const { ledger } = this.run;
    const { householdId, children } = this.enrolled;
    if (day.isClosed || ledger.hasAnswered(householdId, day.on)) return;
    const giveUpAt = performance.now() + callsWithinMs;
    const ids = children.map(({ id }) => id);
    const isThere = () =>
      ledger.calls.some(
        ({ reason, childId, createdAt }) =>
          reason === 'not-answered' &&
          ids.includes(childId) &&
          createdAt >= day.callListAt - minute,
      );
    for (;;) {
      await this.#noteCalls();
      if (isThere() || performance.now() > giveUpAt) return;
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
  }

  comesNot({ script, hasSaidNo }) {
    return hasSaidNo === true || (script.doing === 'forgets' && !script.comesAnyway);
  }

  async #comes(day, { morningId, roomId }) {
    if (day.isClosed || this.comesNot(day)) return;
    const { clinic, clock, ledger } = this.run;
    const { isCollected } = day.script;
    const now = () => clock.now();
    const state = await collect(clinic, { on: day.on, morningId, roomId, isCollected, now });
    ledger.note('came', { household: this.enrolled.householdId, on: day.on, morningId, state });
  }

  async #givesUp(day) {
    if (!day.isClosed && this.comesNot(day)) await this.#loses(day, 'Did not come');
  }

  /** The clinic cannot take the child that day, and knows it the afternoon before. */
  #callsOff(day) {
    return this.#loses(day, 'No nurse that morning');
  }

  async #loses(day, reason) {
    const { clinic, ledger } = this.run;
    for (const { morningId } of day.children) {
      ledger.note('lost', { household: this.enrolled.householdId, on: day.on, morningId });
      await clinic.nurse.post(`/api/clinic/mornings/${morningId}/loss`, { reason });
    }
  }

  #plansOptOut(days) {
    const { optOut, adults } = this.family;
    if (!optOut) return;
    const { clock } = this.run;
    const { firstArrivalAt } = days
      .map((day) => ({
        firstArrivalAt: Math.min(
          ...day.children.map(({ arrivalTime }) =>
            instantAt(day.on, minuteOf(arrivalTime), this.run.zone),
          ),
        ),
      }))
      .at(optOut.beforeMorning);
    const at = Math.max(firstArrivalAt - optOut.hoursBefore * 60 * minute, clock.now() + minute);
    const [{ phone }] = adults;
    this.#at(at, () => this.says(phone, optOut.word));
    this.#at(at + 5 * minute, () => this.#noteCalls());
    if (optOut.againAfterHours !== null)
      this.#at(at + optOut.againAfterHours * 60 * minute, () => this.says(phone, 'START'));
  }

  /** On the day before a morning the mother says by telephone which texts she still wants. */
  #plansConsent(days) {
    const { consent } = this.family;
    if (!consent || consent.becomes === 'same') return;
    const { zone } = this.run;
    const { on } = days[consent.beforeMorning];
    this.#at(instantAt(dayAfter(on, -1), 17 * 60, zone), async () => {
      const { clinic, ledger } = this.run;
      const { householdId, members } = this.enrolled;
      const guardian = members.find(({ standing }) => standing === 'guardian');
      const agrees = consent.becomes === 'no-early';
      await clinic.nurse.post(`/api/clinic/family-members/${guardian.id}/consents`, {
        channel: 'sms',
        address: guardian.phone,
        visits: agrees,
        letters: agrees,
        earlyMorning: false,
        how: 'by-telephone',
      });
      ledger.note('consent', { household: householdId, adult: guardian.id, texts: agrees });
    });
  }

  /** Texts the clinic; when nobody takes it there, the family tries again a little later. */
  async says(phone, body, { tries = 3, onTaken = () => undefined } = {}) {
    const { clock, tally } = this.run;
    const isTaken = await this.home.text(phone, body);
    if (isTaken) onTaken();
    else if (tries > 1) {
      tally.repeatedTexts += 1;
      this.#at(clock.now() + 2 * minute, () =>
        this.says(phone, body, { tries: tries - 1, onTaken }),
      );
    }
  }
}
