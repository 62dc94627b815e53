import { z } from 'zod';

/** What the list of participants may be asked. */
export const participantSorts = ['code', 'site', 'enrolledOn', 'lastVisitOn', 'change', 'nextCloses', 'openQueries'] as const;
export const participantStates = ['enrolled', 'withdrawn', 'completed'] as const;
export const swellingFilters = ['any', 'met', 'not met', 'not judged'] as const;

export const listParticipantsInput = z.strictObject({
  page: z.coerce.number().int().min(0).max(100_000).default(0),
  pageSize: z.coerce.number().int().min(5).max(100).default(25),
  q: z.string().trim().max(40).default(''),
  siteId: z.uuid().optional(),
  cohort: z.string().max(60).optional(),
  state: z.enum(participantStates).optional(),
  swelling: z.enum(swellingFilters).default('any'),
  sort: z.enum(participantSorts).default('code'),
  direction: z.enum(['asc', 'desc']).default('asc'),
});
export type ListParticipantsInput = z.output<typeof listParticipantsInput>;
