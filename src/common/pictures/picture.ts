/**
 * One stroke on a 48-pixel grid: how it is drawn, then its path. 'tone' is a soft fill, 'toned' a line with a soft
 * fill, 'paper' a line filled like the ground, 'dot' a solid fill, 'struck' the stroke that forbids.
 */
export type Stroke = [way: 'line' | 'tone' | 'toned' | 'paper' | 'dot' | 'struck', path: string];
export type Picture = Stroke[];
