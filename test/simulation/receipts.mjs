// What reached the phones and mailboxes, read line by line from the file the stand-ins keep.
import { closeSync, openSync, readSync } from 'node:fs';

const arrivesWithinMs = 5_000;

export class Receipts {
  texts = [];
  mails = [];
  /** The provider's numbers of texts that reached no phone, as far as nobody has taken them from here. */
  notDelivered = [];
  #byId = new Map();
  #byAddress = new Map();
  #onTheWay = new Set();
  #offset = 0;
  #rest = '';

  constructor(file) {
    this.file = file;
  }

  /** Takes in what is new. */
  read() {
    let file;
    try {
      file = openSync(this.file, 'r');
    } catch {
      // Nothing was sent yet.
      return;
    }
    const chunk = Buffer.alloc(1 << 20);
    const parts = [];
    for (let size; (size = readSync(file, chunk, 0, chunk.length, this.#offset)) > 0;) {
      this.#offset += size;
      parts.push(Buffer.from(chunk.subarray(0, size)));
    }
    closeSync(file);
    if (parts.length === 0) return;
    const read = Buffer.concat([Buffer.from(this.#rest, 'latin1'), ...parts]);
    const end = read.lastIndexOf(10) + 1;
    this.#rest = read.subarray(end).toString('latin1');
    for (const line of read.subarray(0, end).toString('utf8').split('\n'))
      if (line !== '') this.#take(JSON.parse(line));
  }

  #take(line) {
    if (line.text) {
      const text = { ...line.text };
      this.texts.push(text);
      this.#byId.set(text.id, text);
      this.#keep(text.phone, text);
      if (text.direction === 'out' && text.statusCallback !== null) this.#onTheWay.add(text);
    } else if (line.mail) {
      this.mails.push(line.mail);
      this.#keep(line.mail.to, line.mail);
    } else if (line.status) {
      const text = this.#byId.get(line.status.id);
      if (!text) return;
      Object.assign(text, { status: line.status.is, errorCode: line.status.code });
      if (text.status === 'queued' || text.status === 'sent') return;
      this.#onTheWay.delete(text);
      if (text.status !== 'delivered') this.notDelivered.push(text.id);
    }
  }

  #keep(address, one) {
    if (!this.#byAddress.has(address)) this.#byAddress.set(address, []);
    this.#byAddress.get(address).push(one);
  }

  /** Waits until the provider knows of every text whether a phone has it. */
  async allArrived() {
    const giveUpAt = performance.now() + arrivesWithinMs;
    for (this.read(); this.#onTheWay.size > 0 && performance.now() < giveUpAt; this.read())
      await new Promise((resolve) => setTimeout(resolve, 10));
  }

  /** The newest link of this kind ('m' or 'i') that came to one of these addresses; null when none did. */
  newestLink(addresses, kind, since = 0) {
    this.read();
    const pattern = new RegExp(`https?://[^\\s]*/${kind}/([A-Za-z0-9_-]+)`);
    const found = addresses
      .flatMap((address) => this.#byAddress.get(address) ?? [])
      .filter((one) => one.direction !== 'in' && one.at >= since && pattern.test(one.body))
      .sort((one, other) => other.at - one.at)[0];
    return found ? { token: pattern.exec(found.body)[1], address: found.phone ?? found.to } : null;
  }
}
