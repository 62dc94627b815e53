import { z } from 'zod';
import { swellingCodes } from '@/instruments/swelling';

/** What the sentence at the top of Results may say. */
export const viewResultsInput = z.strictObject({
  first: z.enum(swellingCodes).optional(),
  second: z.enum(swellingCodes).optional(),
  confirmation: z.enum(['first visit', 'confirmed at the next visit']).default('first visit'),
});
export type ViewResultsInput = z.output<typeof viewResultsInput>;
