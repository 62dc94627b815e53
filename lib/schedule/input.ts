import { z } from 'zod';
import { calendarDay } from '@/lib/work/calendar-day';

/** What visits take from people: the same schema in the browser and on the server. */
const why = (sentence: string) => z.string().trim().min(3, sentence).max(300, 'Use at most 300 characters.');

/** Out of its window a visit begins only with the reason. */
export const windowReason = why('Say why it takes place out of its window.').optional();
export const beginVisitInput = z.strictObject({ id: z.uuid(), windowReason });
export const undoBeginInput = z.strictObject({ id: z.uuid(), reason: why('Say how it came to be begun.') });
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
