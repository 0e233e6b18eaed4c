/** One shape a state, so that none needs its colour: 20 px grid, strokes near 2 px. A stroke width of 0 fills. */
interface MarkPart {
  readonly d: string;
  readonly width: number;
}

const fill = (d: string): readonly MarkPart[] => [{ d, width: 0 }];
const line = (d: string, width = 2): readonly MarkPart[] => [{ d, width }];
const ring = 'M10 2a8 8 0 1 1 0 16a8 8 0 1 1 0-16';
const square = 'M2 2h16v16h-16z';

export const markShapes = {
  enough: fill(
    'M10 1a9 9 0 1 1 0 18 9 9 0 0 1 0-18Zm-4.9 9.2 3.6 3.6 6.2-6.9-1.5-1.4-4.8 5.3-2-2Z',
  ),
  wait: [...line(ring), ...fill('M10 2a8 8 0 0 0 0 16Z')],
  ceiling: fill(
    'M10 1.2 19.4 18H.6Zm-1.1 6 .3 5.6h1.6l.3-5.6Zm1.1 6.6a1.2 1.2 0 1 0 0 2.4 1.2 1.2 0 0 0 0-2.4Z',
  ),
  unsure: [
    ...line('M10 1.6 18.4 10 10 18.4 1.6 10Z'),
    ...line('M7.9 8.4a2.1 2.1 0 1 1 3 1.9c-.7.4-.9.7-.9 1.4', 1.7),
    ...fill('M10 12.8a1.1 1.1 0 1 1 0 2.2a1.1 1.1 0 1 1 0-2.2'),
  ],
  silent: line(
    'M10 2a8 8 0 0 1 3.1.6M16 4.7a8 8 0 0 1 1.8 3.2M17.7 12.2a8 8 0 0 1-1.9 3.3M13 17.4a8 8 0 0 1-4.1.5M5.1 16.3a8 8 0 0 1-2.4-2.8M2 10.4a8 8 0 0 1 .7-3.8M4.7 4a8 8 0 0 1 2.5-1.5',
  ),
  here: fill('M4 1h12v18H4Zm8.6 8a1.2 1.2 0 1 0 0 2.4 1.2 1.2 0 0 0 0-2.4Z'),
  way: line('M2 10h14M11 4.5 16.5 10 11 15.5', 2.2),
  late: [...line(ring), ...line('M10 5v5.3l3.4 2')],
  tube: [...line('M6 1.5h8M7 2v13a3 3 0 0 0 6 0V2'), ...fill('M8 9h4v6a2 2 0 0 1-4 0Z')],
  flag: [...line('M4.5 1.5v17', 2.2), ...fill('M6.5 2.5 17 6.4 6.5 10.5Z')],
  closed: [...line(square), ...line('M2 12 12 2M2 18 18 2M8 18 18 8', 1.8)],
  free: line(square),
  busy: fill('M1 1h18v18H1z'),
  none: [...line(ring), ...line('M6 10h8')],
  no: line('M4 4 16 16M16 4 4 16', 2.4),
  yes: line('M3.5 10.5 8 15l8.5-10', 2.4),
  todo: [
    ...line('M4 2h12a2 2 0 0 1 2 2v12a2 2 0 0 1-2 2H4a2 2 0 0 1-2-2V4a2 2 0 0 1 2-2z'),
    ...line('M10 5.5v5.2', 2.2),
    ...fill('M10 13a1.2 1.2 0 1 1 0 2.4a1.2 1.2 0 1 1 0-2.4'),
  ],
  kept: [
    ...line('M6 9V6.5a4 4 0 0 1 8 0V9'),
    ...fill(
      'M5.5 9h9A1.5 1.5 0 0 1 16 10.5v6a1.5 1.5 0 0 1-1.5 1.5h-9A1.5 1.5 0 0 1 4 16.5v-6A1.5 1.5 0 0 1 5.5 9z',
    ),
  ],
  wave: line('M3 8v4M7 5v10M11 2.5v15M15 6v8M18.5 8.5v3'),
} as const satisfies Record<string, readonly MarkPart[]>;

export type MarkName = keyof typeof markShapes;
