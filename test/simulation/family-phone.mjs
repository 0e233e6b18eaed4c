// A family at home: it reads what came, opens the page, answers there or by text.
import { Browser } from './requests.mjs';

export class FamilyHome {
  #phones = new Map();

  constructor({ family, origin, control, receipts, tally }) {
    Object.assign(this, { family, origin, control, receipts, tally });
  }

  /** Another phone without any memory of the clinic, or the usual one. */
  #browser(which) {
    if (!this.#phones.has(which))
      this.#phones.set(
        which,
        new Browser({ origin: this.origin, network: this.family.network, tally: this.tally }),
      );
    return this.#phones.get(which);
  }

  /**
   * Opens the newest link of this night and answers there for every child.
   * @returns the outcome's kind, or why there was none: 'no-link', 'not-open'.
   */
  async answerOnPage({ on, since, bornOn, answer, lastIntakeAt = null, phone = 'own', key, now }) {
    const addresses = this.family.adults.flatMap(({ phone: number, email }) => [number, email]);
    const link = this.receipts.newestLink(addresses, 'm', since);
    if (!link) return 'no-link';
    const browser = this.#browser(phone);
    await browser.post('/api/family/links/describe', { token: link.token });
    await browser.post('/api/family/links/open', {
      token: link.token,
      bornOn,
      isRemembered: phone === 'own',
    });
    const page = await browser.get(`/api/family/morning-question?on=${on}`);
    if (page.state !== 'open') return 'not-open';
    const outcome = await browser.post('/api/family/fasting-checks', {
      submissionKey: key,
      on,
      answers: page.questions.map(({ morningId }) => ({ morningId, answer, lastIntakeAt })),
      deviceAt: new Date(now).toISOString(),
    });
    return outcome.kind;
  }

  /** "Not coming" or "late" on the page that is open already. */
  async changeOnPage(change) {
    const outcome = await this.#browser('own').post('/api/family/morning-changes', change);
    return outcome.kind;
  }

  /** @returns whether the clinic took it. */
  async text(phone, body) {
    const answer = await fetch(`${this.control}/replies`, {
      method: 'POST',
      headers: { 'Content-Type': 'application/json' },
      body: JSON.stringify({ phone, body }),
    });
    if (!answer.ok) throw new Error(`The stand-in refused a text: ${answer.status}`);
    return (await answer.json()).isTaken;
  }
}
