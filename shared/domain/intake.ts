import type { Item } from './fasting-protocol';

/** Meals and feeds, as against drinks that do not end hunger. Free of zones, for the phone. */
export const isMeal = (item: Item): boolean => item !== 'water' && item !== 'other';
