// Chance that can be repeated: the same text gives the same stream on every machine.

/** A stream of chance. Names keep streams apart, so that one more draw here changes nothing there. */
export function chanceOf(...names) {
  let state = hashOf(names.join('/'));
  // mulberry32, public domain: small, and good enough to make up families.
  const next = () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
  const int = (from, to) => from + Math.floor(next() * (to - from + 1));
  return {
    int,
    happens: (share) => next() < share,
    pick: (list) => list[int(0, list.length - 1)],
    shuffled: (list) => {
      const mixed = [...list];
      for (let at = mixed.length - 1; at > 0; at -= 1) {
        const other = int(0, at);
        [mixed[at], mixed[other]] = [mixed[other], mixed[at]];
      }
      return mixed;
    },
    uuid: () => {
      const digits = Array.from({ length: 32 }, () => int(0, 15).toString(16));
      digits[12] = '4';
      digits[16] = '8';
      return digits.join('').replace(/^(.{8})(.{4})(.{4})(.{4})(.{12})$/, '$1-$2-$3-$4-$5');
    },
  };
}

/**
 * Deals from a deck that is shuffled again whenever it is empty: also a small run meets every kind,
 * and a big one meets each as often as the deck says. `deck` is `{ kind: how many }`.
 */
export function dealer(chance, deck) {
  const cards = Object.entries(deck).flatMap(([kind, count]) => Array(count).fill(kind));
  let left = [];
  return () => {
    if (left.length === 0) left = chance.shuffled(cards);
    return left.pop();
  };
}

// FNV-1a, 32 bits.
function hashOf(text) {
  let hash = 0x811c9dc5;
  for (const byte of Buffer.from(text)) hash = Math.imul(hash ^ byte, 0x01000193);
  return hash >>> 0;
}
