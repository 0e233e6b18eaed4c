// How a family answers on a morning, or does not.

const minute = 60_000;
const digits = { ar: ['٠', '١', '٢', '٣'] };

/** Does what the script says for this morning, some minutes after the question. */
export async function doOnMorning(life, day) {
  const { doing } = day.script;
  await doings[doing](life, day);
}

const doings = {
  web: (life, day) => byPage(life, day),
  digit: (life, day) => tellByText(life, day, '1'),
  forgets: () => Promise.resolve(),
  'too-early': () => Promise.resolve(),
  'called-off': () => Promise.resolve(),
  async twice(life, day) {
    const key = life.family.uuid();
    await byPage(life, day, { key });
    // The phone had no signal in between and sends the same again.
    await byPage(life, day, { key });
    await tellByText(life, day, '1');
  },
  async 'changes-mind'(life, day) {
    await byPage(life, day);
    await tellByText(life, day, '3');
  },
  'other-phone': (life, day) => byPage(life, day, { phone: 'other' }),
  // Nobody knows this number: a person finds out who it was.
  'unknown-number': (life) => life.says(life.family.strangePhone, '1'),
  async ate(life, day) {
    if (await byPage(life, day, { answer: 'sip' })) return;
    await tellByText(life, day, '2');
    // "Which child?" is asked back: 4 is the first of them.
    if (life.enrolled.children.length > 1) await life.says(bringerOf(life, day).phone, '4');
  },
  unclear: (life, day) => life.says(bringerOf(life, day).phone, 'she slept, all fine?'),
  'not-coming': (life, day) => tellByText(life, day, '3'),
  async late(life, day) {
    if (!(await byPage(life, day))) return;
    await life.home.changeOnPage({
      kind: 'late',
      submissionKey: life.family.uuid(),
      on: day.on,
      newArrivalAt: new Date(day.firstArrivalAt + 15 * minute).toISOString(),
      deviceAt: new Date(life.run.clock.now()).toISOString(),
    });
  },
};

/** @returns whether the clinic has the answer. */
async function byPage(life, day, { answer = 'nothing', phone = 'own', key } = {}) {
  const { clock, ledger, tally } = life.run;
  const { householdId, children } = life.enrolled;
  const now = clock.now();
  const kind = await life.home.answerOnPage({
    on: day.on,
    since: day.eveningAt - minute,
    bornOn: children[0].bornOn,
    answer,
    lastIntakeAt: answer === 'sip' ? new Date(day.questionAt - 10 * minute).toISOString() : null,
    phone,
    key: key ?? life.family.uuid(),
    now,
  });
  const isKept = kind !== 'no-link' && kind !== 'not-open';
  tally.answersByPage += isKept ? 1 : 0;
  if (isKept) ledger.note('answered', { household: householdId, on: day.on, answer, by: 'page' });
  return isKept;
}

/** A digit counts for every child of the household; it comes from whoever brings the children. */
export async function tellByText(life, day, digit) {
  const { ledger, tally, clock } = life.run;
  const own = digits[life.family.language]?.[Number(digit)] ?? digit;
  const isAsked = clock.now() >= day.questionAt || digit === '3';
  await life.says(bringerOf(life, day).phone, own, {
    onTaken: () => {
      tally.answersByText += 1;
      if (digit === '3') day.hasSaidNo = true;
      if (!isAsked) return;
      const { householdId } = life.enrolled;
      ledger.note('answered', { household: householdId, on: day.on, answer: digit, by: 'text' });
    },
  });
}

function bringerOf({ family, enrolled }, { escortId }) {
  const { fullName } = enrolled.members.find(({ id }) => id === escortId);
  return family.adults.find((adult) => adult.fullName === fullName);
}
