import { z } from 'zod';
import { calendarDay } from '@/lib/work/calendar-day';
import { signCode } from './answers';

/** What safety takes from people: the same schemas in the browser and on the server. */
export const reportSymptomsInput = z.strictObject({
  /** Made once per report on the device: sent twice, it is one report. */
  clientKey: z.uuid(),
  noticedOn: calendarDay('Give the day on which you noticed it.'),
  signs: z.array(signCode).max(40),
  lastedOverADay: z.boolean().nullable(),
  soreness: z.strictObject({ days: z.int().min(1, 'Give the days, 1 or more.').max(60), onlyTrainedMuscles: z.boolean() }).nullable(),
  note: z.string().trim().max(1000, 'Use at most 1 000 characters.').nullable(),
});
export type ReportSymptomsInput = z.infer<typeof reportSymptomsInput>;

export const checkArmInput = z.strictObject({
  /** The key of the session that the check belongs to. */
  clientKey: z.uuid(),
  armCheck: z.enum(['the same', 'a little fuller', 'clearly fuller', 'not sure']),
});

export const listReportsInput = z.strictObject({});
export const reportIdInput = z.strictObject({ id: z.uuid() });

export const reviewReportInput = z.strictObject({
  id: z.uuid(),
  outcome: z.enum(['no action', 'advice', 'unscheduled visit', 'adverse event'], { error: 'Choose how the review ends.' }),
  note: z.string().trim().min(3, 'Say what was found and agreed.').max(1000, 'Use at most 1 000 characters.'),
  /** The day of the unscheduled visit; only with 'unscheduled visit'. */
  visitOn: calendarDay('Give the day of the unscheduled visit.').optional(),
});
export type ReviewReportInput = z.infer<typeof reviewReportInput>;
