// Whether the book-keeper would have seen it: the books of a run are made wrong in one place for each rule, and
// the rule must be named. A run in which nothing is wrong proves nothing without this.
import { compare, rules } from './book-keeper/book-keeper.mjs';

const minute = 60_000;
const hour = 60 * minute;

/** @returns `{ passed, failed }` and the rules that were not seen. */
export function checkBookKeeper(books) {
  const unseen = Object.keys(rules).filter((rule) => {
    const wrong = globalThis.structuredClone(books);
    if (!doctors[rule](wrong)) return true;
    return !compare(wrong).violations.some((violation) => violation.rule === rule);
  });
  return { passed: Object.keys(rules).length - unseen.length, failed: unseen.length, unseen };
}

const labelOf = ({ labels }, { id }) => labels.find(({ providerId }) => providerId === id);

/** The first text of this kind that arrived. */
function textOf(books, kind) {
  const text = books.texts.find(
    (one) => labelOf(books, one)?.kind === kind && one.status === 'delivered',
  );
  return text && { text, label: labelOf(books, text) };
}

const householdOf = ({ lines }, household) =>
  lines.find((line) => line.what === 'household' && line.household === household);

/** Each makes one thing wrong; false when the run holds nothing to do it with. */
const doctors = {
  lost(books) {
    const found = textOf(books, 'evening');
    if (!found) return false;
    books.texts.splice(books.texts.indexOf(found.text), 1);
    books.calls = [];
    return true;
  },
  doubled(books) {
    const found = textOf(books, 'evening');
    if (!found) return false;
    books.texts.push({ ...found.text, id: 'SM-again', at: found.text.at + minute });
    return true;
  },
  'opted-out'(books) {
    const found = textOf(books, 'evening');
    if (!found) return false;
    const { phone, at } = found.text;
    const stop = { id: 'SM-stop', direction: 'in', phone, body: 'alto', status: 'received' };
    books.texts.unshift({ ...stop, at: at - 10 * minute });
    return true;
  },
  quiet(books) {
    const found = textOf(books, 'evening');
    if (found) found.text.at += 4 * hour;
    return Boolean(found);
  },
  late(books) {
    const found = textOf(books, 'evening');
    if (found) found.text.at += 20 * hour;
    return Boolean(found);
  },
  'asked-again'(books) {
    const found = textOf(books, 'morning');
    if (!found) return false;
    const { household, morningOn: on } = found.label;
    const at = found.text.at - 5 * minute;
    books.lines.push({ what: 'answered', household, on, answer: 'nothing', by: 'page', at });
    return true;
  },
  'not-due'(books) {
    // Somebody else brings the child than the one who was asked: nobody asked the right one.
    const found = textOf(books, 'morning');
    const household = found && householdOf(books, found.label.household);
    if (!household) return false;
    const stranger = { ...household.adults[0], id: -1, phone: '+12065550198', email: null };
    household.adults.push(stranger);
    found.text.phone = stranger.phone;
    return true;
  },
  unsigned(books) {
    const found = textOf(books, 'evening');
    if (!found) return false;
    const household = householdOf(books, found.label.household);
    for (const adult of household.adults) adult.language = 'vi';
    return true;
  },
  unsafe(books) {
    const found = textOf(books, 'evening');
    if (found) found.text.body += ' TB';
    return Boolean(found);
  },
  stray(books) {
    const found = textOf(books, 'evening');
    if (found) found.text.phone = '+12065550199';
    return Boolean(found);
  },
  'no-call'(books) {
    const needsPerson = books.lines.some(
      ({ what, adults }) =>
        what === 'household' && adults.some(({ texts, mail }) => !texts && !mail),
    );
    books.calls = [];
    return needsPerson;
  },
  'state-unknown'(books) {
    const [id] = [...books.states.keys()];
    if (id !== undefined) books.states.set(id, 'planned');
    return id !== undefined;
  },
};
