// The families as the book-keeper knows them: who can be written to at which moment, and what was planned.
import { isSigned, switchesOff, switchesOn } from './rules.mjs';

export class Households {
  #byId = new Map();
  #byAddress = new Map();
  #offAt = new Map();

  constructor({ lines, texts }) {
    for (const line of lines) this.#take(line);
    for (const text of texts)
      if (text.direction === 'in' && text.status !== 'not-taken') this.#hear(text);
  }

  get all() {
    return [...this.#byId.values()];
  }

  ofAddress(address) {
    return this.#byAddress.get(address);
  }

  #take(line) {
    if (line.what === 'household') {
      const household = { ...line, id: line.household, days: new Map(), changes: [] };
      household.children = new Map(line.children.map((child) => [child.id, child]));
      this.#byId.set(household.id, household);
      for (const adult of line.adults)
        for (const address of [adult.phone, adult.email])
          if (address) this.#byAddress.set(address, { household, adult });
      return;
    }
    const household = this.#byId.get(line.household);
    if (!household) return;
    if (line.what === 'consent') {
      household.changes.push(line.at);
      const adult = household.adults.find(({ id }) => id === line.adult);
      adult.consents = [...(adult.consents ?? []), line];
    }
    if (line.what === 'planned')
      household.days.set(line.on, {
        on: line.on,
        household,
        plannedAt: line.at,
        escortId: line.escortId,
        children: line.children,
        answers: [],
        lostAt: null,
        isClosed: false,
      });
    if (line.what === 'answered')
      household.days.get(line.on)?.answers.push({ at: line.at, answer: line.answer });
    if (line.what === 'lost') {
      const day = household.days.get(line.on);
      if (day) day.lostAt ??= line.at;
      if (day && line.isClosed) day.isClosed = true;
      household.changes.push(line.at);
    }
    if (line.what === 'contact') household.changes.push(line.at);
  }

  #hear({ phone, body, at }) {
    const isOff = switchesOff(body);
    if (!isOff && !switchesOn(body)) return;
    if (!this.#offAt.has(phone)) this.#offAt.set(phone, []);
    this.#offAt.get(phone).push({ at, isOff });
    this.#byAddress.get(phone)?.household.changes.push(at);
  }

  /** Since when this number wants no texts at an instant; null when it does. */
  offSince(phone, instant) {
    const turns = (this.#offAt.get(phone) ?? []).filter(({ at }) => at <= instant);
    const last = turns.at(-1);
    if (!last?.isOff) return null;
    const before = turns.findLastIndex(({ isOff }) => !isOff);
    return turns[before + 1].at;
  }

  mayText(adult, instant) {
    const { phone } = adult;
    return Boolean(phone) && agreed(adult, instant) && this.offSince(phone, instant) === null;
  }

  /** Agreed to texts before 8 in the morning; what is said by telephone later never adds that yes here. */
  mayTextEarly(adult, instant) {
    return adult.early && !(adult.consents ?? []).some(({ at }) => at <= instant);
  }

  hasConsented(adult, instant) {
    return agreed(adult, instant);
  }

  mayMail({ email, mail }) {
    return Boolean(email) && mail;
  }

  /**
   * Who hears of a night or a morning: the one who is named for it, or when nobody is named or that one cannot be
   * written to, the first adult who can be, texts before e-mail and guardians before helpers. A helper hears of the
   * mornings that are given to the helper, and of no others.
   */
  whoHears({ household, escortId }, namedId, instant) {
    const reach = (adult) => this.mayText(adult, instant) || this.mayMail(adult);
    const rank = ({ standing }) => (standing === 'guardian' ? 0 : 1);
    const adults = household.adults
      .filter(({ standing, id }) => standing === 'guardian' || id === escortId)
      .sort((one, other) => rank(one) - rank(other));
    const named = adults.find(({ id }) => id === namedId);
    if (named && reach(named)) return named;
    return (
      adults.find((adult) => this.mayText(adult, instant)) ??
      adults.find((adult) => this.mayMail(adult)) ??
      null
    );
  }

  hasWords({ language }) {
    return isSigned(language);
  }
}

/** What this person agreed to when the child was enrolled, or said by telephone since. */
const agreed = ({ texts, consents = [] }, instant) =>
  consents.filter(({ at }) => at <= instant).at(-1)?.texts ?? texts;
