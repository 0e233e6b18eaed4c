import type { Picture } from './picture';

/** States of a morning where the horizon has no room. */
export const morningPictures = {
  'morning-done': [
    ['tone', 'M16 11.5a8 8 0 1 1 16 0a8 8 0 1 1-16 0z'],
    ['line', 'M16 11.5a8 8 0 1 1 16 0a8 8 0 1 1-16 0zM4.5 24h39'],
  ],
  'morning-next': [
    ['tone', 'M16 24a8 8 0 0 1 16 0z'],
    ['line', 'M16 24a8 8 0 0 1 16 0M4.5 24h39'],
  ],
  'morning-later': [['line', 'M16 36.5a8 8 0 1 1 16 0a8 8 0 1 1-16 0zM4.5 24h39']],
  'morning-lost': [
    ['tone', 'M20 19.5a4 4 0 0 1 .5-8 6 6 0 0 1 5.6-5.2A8 8 0 1 0 20 19.5z'],
    [
      'line',
      'M17.3 19c-3.1-1.1-5.3-4-5.3-7.5c0-4.4 3.6-8 8-8c2.2 0 4.1 .9 5.6 2.2M20 19.5a4 4 0 0 1 .5-8 6 6 0 0 1 11.5-1.5 5 5 0 0 1 4 9.5zM4.5 24h39',
    ],
  ],
} satisfies Record<string, Picture>;
