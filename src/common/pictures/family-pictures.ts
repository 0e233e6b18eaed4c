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
const turning = new Set(['leave-home', 'leave-by-bus', 'papers', 'emergency', 'next']);

const rare = signal<Pictures | null>(null);
let isFetching = false;

/** Half of the drawings are seldom asked for: they come when the first of them is. */
async function fetchRare(): Promise<void> {
  if (isFetching) return;
  isFetching = true;
  try {
    const [mouth, visit] = await Promise.all([
      import('./rare-mouth-pictures'),
      import('./visit-pictures'),
    ]);
    rare.set({ ...mouth.rareMouthPictures, ...visit.visitPictures });
  } catch {
    // No signal: the caption beside the picture says it all; the next picture asks again.
    isFetching = false;
  }
}

/**
 * The strokes of a picture; null while it is fetched, or for a name that this application does not know yet. Read in
 * a computed: the answer changes when the rare ones have come.
 */
export function familyPicture(name: string): Picture | null {
  const picture = atHand[name] ?? rare()?.[name];
  if (!picture && rare() === null) void fetchRare();
  return picture ?? null;
}

export function turnsRound(name: string): boolean {
  return turning.has(name);
}
