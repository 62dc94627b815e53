import { z } from 'zod';
import { swellingCodes } from '@/instruments/swelling';

export const confirmations = ['first visit', 'confirmed at the next visit'] as const;

/** What the sentence at the top of Results may say. */
export const viewResultsInput = z.strictObject({
  first: z.enum(swellingCodes).optional(),
  second: z.enum(swellingCodes).optional(),
  confirmation: z.enum(confirmations).default('first visit'),
  cohort: z.string().regex(/^[a-z0-9-]{1,60}$/, 'There is no such cohort.').optional(),
  siteId: z.uuid().optional(),
});
export type ViewResultsInput = z.output<typeof viewResultsInput>;

/** Is this a role that may not read rows, and so sees no small count? */
export const hidesSmall = (role: string): boolean => role === 'investigator';

/** Such a role may choose a cohort or a site, not both: one cohort at one site, less from the site, gives small counts. */
export const isOffered = <Asked extends Pick<ViewResultsInput, 'cohort' | 'siteId'>>(asked: Asked | undefined, role: string): asked is Asked => asked !== undefined && !(hidesSmall(role) && asked.cohort && asked.siteId);
