import { z } from 'zod';
import { reportedSigns, type ReportedSign } from '@/instruments/safety/symptom-report';

/** The signs a report may hold. */
export const signCode = z.enum(reportedSigns.map(({ code }) => code) as [ReportedSign, ...ReportedSign[]]);

/** A report's answers as they are kept; an arm check before training holds no signs. */
export const keptAnswers = z.object({
  signs: z.array(signCode),
  lastedOverADay: z.boolean().nullable(),
  soreness: z.object({ days: z.int(), onlyTrainedMuscles: z.boolean() }).nullable(),
  armCheck: z.string().optional(),
});
