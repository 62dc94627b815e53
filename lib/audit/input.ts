import { z } from 'zod';
import { calendarDay } from '@/lib/work/calendar-day';

/** What of the trail is asked for: the sentence over the table, as data. */
export const trailFilter = z.strictObject({
  /** Label of the person, 'C-03', or a participant's code. */
  who: z.string().trim().max(20).default(''),
  /** Participant code. */
  code: z.string().trim().max(12).default(''),
  act: z.string().max(60).default(''),
  table: z.string().max(60).default(''),
  field: z.string().max(60).default(''),
  /** Days, in UTC, both inside. */
  from: z.union([calendarDay('Give the day as 2027-03-01.'), z.literal('')]).default(''),
  to: z.union([calendarDay('Give the day as 2027-03-01.'), z.literal('')]).default(''),
});
export const listTrailInput = trailFilter.extend({
  /** Only entries before this one: the way to the next page. */
  before: z.string().regex(/^\d{1,18}$/).optional(),
  limit: z.coerce.number().int().min(1).max(500).default(50),
});
export type TrailFilter = z.output<typeof trailFilter>;
export type ListTrailInput = z.output<typeof listTrailInput>;
