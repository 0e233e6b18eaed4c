import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { facePictures } from '../../src/common/pictures/face-pictures';
import { framePictures } from '../../src/common/pictures/frame-pictures';
import { journeyPictures } from '../../src/common/pictures/journey-pictures';
import { mouthPictures } from '../../src/common/pictures/mouth-pictures';
import type { Picture } from '../../src/common/pictures/picture';
import { rareMouthPictures } from '../../src/common/pictures/rare-mouth-pictures';
import { visitPictures } from '../../src/common/pictures/visit-pictures';

const groups: Record<string, Picture>[] = [
  facePictures,
  framePictures,
  journeyPictures,
  mouthPictures,
  rareMouthPictures,
  visitPictures,
];
const all = new Map(groups.flatMap((group) => Object.entries(group)));
const mostBytes = 2000;

/** What goes, or must not go, into the mouth in the hours before; each stands on the plan both ways. */
const byMouth = [
  'solid-food',
  'cows-milk',
  'formula-bottle',
  'breast-feeding',
  'water',
  'sip',
  'juice',
  'candy',
  'chewing-gum',
  'medicine-bottle',
  'medicine-syringe',
  'toothbrush',
  'pacifier',
  'tube-feed',
];
const theVisit = ['arrive', 'hold-still', 'tube-in-nose', 'done-hug', 'feed-again', 'after-care'];
const around = ['mask', 'wait-here', 'wait-outside', 'call-us', 'interpreter', 'emergency'];
const theWay = ['leave-home', 'leave-by-bus', 'on-foot', 'taxi'];

test.each(byMouth)('%s is there, and forbidden by one stroke', (name) => {
  expect(all.get(name)?.some(([way]) => way === 'struck')).toBe(false);
  expect(all.get(`${name}-not`)?.at(-1)).toEqual(['struck', 'M6 6l36 36']);
});

test.each([...theVisit, ...around, ...theWay])('%s is there', (name) => {
  expect(all.get(name)?.length).toBeGreaterThan(0);
});

test.each([...all])('%s fits its grid and its weight', (_, picture) => {
  const paths = picture.map(([way, path]) => `<path class="${way}" d="${path}"/>`).join('');
  expect(`<svg viewBox="0 0 48 48">${paths}</svg>`.length).toBeLessThan(mostBytes);
  for (const [, path] of picture) {
    const [, x, y] = /^M(-?[\d.]+)[ ,]?(-?[\d.]+)/.exec(path) ?? [];
    for (const place of [x, y]) {
      expect(Number(place)).toBeGreaterThanOrEqual(0);
      expect(Number(place)).toBeLessThanOrEqual(48);
    }
  }
});

test.each(['night-path.ts', 'next-morning.ts', 'morning-question.ts'])(
  'every picture that server/fasting/%s names is drawn',
  (file) => {
    const text = readFileSync(join(__dirname, '../../server/fasting', file), 'utf8');
    const lists = [
      ...text.matchAll(/pictures: \[([^\]]*)\]/g),
      ...text.matchAll(/\[('[a-z-]+'), '(?:bring|visit)\.[a-z]+'\]/g),
      ...(/function pictureOf[\s\S]*?\n}/.exec(text)?.[0].matchAll(/return (.*);/g) ?? []),
    ];
    const names = lists.flatMap(([, list]) =>
      [...(list ?? '').matchAll(/'([a-z]+(?:-[a-z]+)*)'/g)].map(([, name]) => name ?? ''),
    );
    const drawn = names.filter((name) => name !== 'formula' && name !== 'family-food');
    expect(drawn.length).toBeGreaterThan(3);
    expect(drawn.filter((name) => !all.has(name))).toEqual([]);
  },
);
