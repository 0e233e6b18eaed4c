// What goes wrong in a run: providers that refuse, dawdle, double and lose; programs and database that fall.
import { dayAfter, instantAt, minuteOf } from './business-clock.mjs';
import { chanceOf, dealer } from './chance.mjs';

/** Share of the addresses with a morning ahead that get into trouble in a night. */
const faultyShare = 0.5;

const textFaults = {
  'delay:ms=600': 3,
  'refuse:code=21614,status=400': 2,
  'refuse:code=21610,status=400': 1,
  'refuse:code=20429,status=429': 2,
  'refuse:code=20500,status=503': 2,
  'refuse:code=20500,status=503,times=30': 1,
  'hold:': 2,
  'accept-then-hold:': 4,
  'double-reports:times=4': 3,
  'no-reports:times=4': 3,
  'late-reports:ms=2500,times=4': 2,
  'report-failure:code=30003': 2,
  'report-failure:code=30005': 1,
  'report-failure:code=30007,times=30': 1,
};

const mailFaults = {
  'delay:ms=600': 2,
  'refuse:code=550': 1,
  'refuse:code=452': 2,
  'accept-then-hold:': 2,
  'hold:': 1,
};

const falls = {
  nothing: 3,
  'sender killed': 4,
  'two senders': 2,
  'database restarted': 1,
  'web killed': 2,
};

export class Troubles {
  constructor(run, seed) {
    Object.assign(this, { run });
    this.chance = chanceOf(seed, 'troubles');
    this.dealText = dealer(this.chance, textFaults);
    this.dealMail = dealer(this.chance, mailFaults);
    this.dealFall = dealer(this.chance, falls);
  }

  /** Every day at noon the night to come gets its troubles. */
  begin(days) {
    const { timeline, zone, dayAt, site } = this.run;
    for (let day = 0; day < days; day += 1) {
      const on = dayAt(day);
      timeline.add(instantAt(on, 12 * 60, zone), () => this.#arrange(dayAfter(on, 1)));
      timeline.add(instantAt(on, minuteOf(site.eveningTextTime), zone), () =>
        this.#fall(dayAfter(on, 1)),
      );
    }
  }

  #nightsOf(on) {
    return this.run.ledger.lines.filter((line) => line.what === 'planned' && line.on === on);
  }

  async #arrange(on) {
    const { control, ledger, timeline, site } = this.run;
    const nights = this.#nightsOf(on);
    if (nights.length === 0) return;
    const faults = nights.flatMap(({ household }) => this.#faultsOf(household));
    const answer = await fetch(`${control}/faults`, {
      method: 'PUT',
      headers: { 'Content-Type': 'application/json' },
      body: JSON.stringify({ faults: faults.slice(0, 100) }),
    });
    if (!answer.ok) throw new Error(`The stand-in refused faults: ${await answer.text()}`);
    for (const { channel, to, does } of faults)
      ledger.note('fault', { channel, address: to, does });
    const arrivals = nights.flatMap(({ children }) => children.map(({ arrivalAt }) => arrivalAt));
    const questionAt = Math.min(...arrivals) - site.morningQuestionMinutesBefore * 60_000;
    timeline.add(questionAt, () => this.#fall(on));
  }

  #faultsOf(household) {
    const { adults } = this.run.ledger.lines.find(
      (line) => line.what === 'household' && line.household === household,
    );
    return adults.flatMap(({ phone, email }) => [
      ...(this.chance.happens(faultyShare) ? [faultFrom('sms', phone, this.dealText())] : []),
      ...(email && this.chance.happens(faultyShare)
        ? [faultFrom('mail', email, this.dealMail())]
        : []),
    ]);
  }

  /** Something falls while messages go out, some milliseconds after their moment. */
  async #fall(on) {
    const { house, ledger, tally } = this.run;
    if (this.#nightsOf(on).length === 0) return;
    const fall = this.dealFall();
    const afterMs = this.chance.int(0, 250);
    if (fall === 'nothing') return;
    await new Promise((resolve) => setTimeout(resolve, afterMs));
    await this.#acts(house)[fall]();
    tally.falls[fall] = (tally.falls[fall] ?? 0) + 1;
    ledger.note('trouble', { fall });
  }

  #acts(house) {
    return {
      'sender killed': async () => {
        await house.sender.kill();
        await house.sender.start();
      },
      'two senders': () => house.toggleSecondSender(),
      'database restarted': () => house.restartDatabase(),
      'web killed': async () => {
        await house.web.kill();
        await house.web.start();
      },
    };
  }
}

/** 'refuse:code=21614,status=400' is told shortly, because a deck is a list of names. */
function faultFrom(channel, to, name) {
  const [does, more] = name.split(':');
  const numbers = more
    .split(',')
    .filter(Boolean)
    .map((part) => part.split('='))
    .map(([key, value]) => [key, Number(value)]);
  return { channel, to, does, ...Object.fromEntries(numbers) };
}
