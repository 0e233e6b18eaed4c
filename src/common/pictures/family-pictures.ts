import { signal } from '@angular/core';
import { facePictures } from './face-pictures';
import { framePictures } from './frame-pictures';
import { journeyPictures } from './journey-pictures';
import { mouthPictures } from './mouth-pictures';
import type { Picture } from './picture';

type Pictures = Record<string, Picture | undefined>;

const atHand: Pictures = {
  ...facePictures,
  ...framePictures,
  ...journeyPictures,
  ...mouthPictures,
};

/** Pictures that show a direction and turn round in right-to-left. */
const turning = new Set([
  'leave-home',
  'leave-by-bus',
  'taxi',
  'on-foot',
  'papers',
  'emergency',
  'next',
]);

/** Half of the drawings are seldom asked for: a group comes when the first name of it is not at hand. */
const groups: (() => Promise<Pictures>)[] = [
  () => import('./visit-pictures').then((file) => file.visitPictures),
  () => import('./rare-mouth-pictures').then((file) => file.rareMouthPictures),
];
const rare = signal<Pictures>({});
let fetching: Promise<void> | null = null;

async function fetchUntilFound(name: string): Promise<void> {
  for (let group = groups[0]; group && !rare()[name]; group = groups[0]) {
    const pictures = await group();
    groups.shift();
    rare.update((known) => ({ ...known, ...pictures }));
  }
}

/** One after the other. With no signal the caption beside the picture says it all; the next picture asks again. */
function fetchRare(name: string): void {
  fetching = (fetching ?? Promise.resolve())
    .then(() => fetchUntilFound(name))
    .catch(() => undefined);
}

/**
 * The strokes of a picture; null while it is fetched, or for a name that this application does not know yet. Read in
 * a computed: the answer changes when the rare ones have come.
 */
export function familyPicture(name: string): Picture | null {
  const picture = atHand[name] ?? rare()[name];
  if (!picture && groups.length > 0) fetchRare(name);
  return picture ?? null;
}

export function turnsRound(name: string): boolean {
  return turning.has(name);
}
