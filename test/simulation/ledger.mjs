// What happened to the families, line by line: all that the book-keeper is told beside what was received.

export class Ledger {
  lines = [];
  #calls = new Map();

  constructor(clock) {
    this.clock = clock;
  }

  /** `what` names the kind of line: household, planned, invited, answered, lost, fault, trouble. */
  note(what, facts) {
    this.lines.push({ at: this.clock.now(), what, ...facts });
  }

  /** The call list as staff see it; each task is kept once. */
  noteCalls({ open }) {
    for (const { id, reason, childId, familyMember, urgentAt, createdAt } of open)
      this.#calls.set(id, {
        id,
        reason,
        childId,
        familyMemberId: familyMember?.id ?? null,
        urgentAt: Date.parse(urgentAt),
        createdAt: Date.parse(createdAt),
      });
  }

  get calls() {
    return [...this.#calls.values()];
  }

  hasAnswered(household, on) {
    return this.lines.some(
      (line) => line.what === 'answered' && line.household === household && line.on === on,
    );
  }
}
