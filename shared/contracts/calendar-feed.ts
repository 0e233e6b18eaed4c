import * as z from 'zod';

/** The address that a family's own calendar follows; null when there is none. */
export const calendarFeed = z.object({ url: z.string().nullable() });
export type CalendarFeed = z.infer<typeof calendarFeed>;
