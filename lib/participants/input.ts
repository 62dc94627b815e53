import { z } from 'zod';
import { enrolInput } from '@/lib/enrolment/input';

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

const fact = enrolInput.shape;
const reason = z.string().trim().min(5, 'Say why the value changes.').max(500, 'Use at most 500 characters.');
/** The query that the correction answers, in the version that was read. */
const query = z.strictObject({ id: z.uuid(), version: z.int() }).optional();
const correction = <N extends string, V extends z.ZodType>(field: N, value: V) => z.strictObject({ code: z.string().max(12), field: z.literal(field), value, reason, query });

/** A fact of a participant put right: the rules are those of the enrolment. A height is given in centimetres. */
export const correctFactInput = z.discriminatedUnion('field', [
  correction('affected_side', fact.affectedSide),
  correction('dominant_side', fact.dominantSide),
  correction('surgery_on', fact.surgeryOn),
  correction('surgery', fact.surgery),
  correction('axillary_procedure', fact.axillaryProcedure),
  correction('nodes_removed', fact.nodesRemoved),
  correction('radiotherapy', fact.radiotherapy),
  correction('systemic_therapy', fact.systemicTherapy),
  correction('height_mm', fact.heightCm),
  correction('age_years', z.coerce.number().int('Give the age in whole years.').min(18, 'Under 18 cannot be right.').max(110, 'Over 110 cannot be right.')),
]);
export type CorrectFactInput = z.output<typeof correctFactInput>;
