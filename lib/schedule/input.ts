import { z } from 'zod';
import { calendarDay } from '@/lib/work/calendar-day';

/** What visits take from people: the same schema in the browser and on the server. */
const why = (sentence: string) => z.string().trim().min(3, sentence).max(300, 'Use at most 300 characters.');

export const beginVisitInput = z.strictObject({ id: z.uuid() });
export const completeVisitInput = z.strictObject({ id: z.uuid() });
export const bookVisitInput = z.strictObject({
  id: z.uuid(),
  on: calendarDay('Give the day of the appointment.'),
  time: z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Give the time as 09:30.'),
});
export const missVisitInput = z.strictObject({ id: z.uuid(), missedReason: why('Say why the visit did not take place.') });
export const addVisitInput = z.strictObject({
  code: z.string().max(12),
  on: calendarDay('Give the day of the visit.'),
  why: why('Say what the unscheduled visit is for.'),
});
