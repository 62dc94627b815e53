import { outsideRatio } from '@/instruments/measurement/parse';
import { z } from 'zod';
import { fieldTargetInput } from '@/lib/queries/input';
import { windowReason } from '@/lib/schedule/input';

/** What limb assessments take from people: the same schema in the browser and on the server. */
const girthMm = z.int('Girths are whole millimetres.').min(100, 'A girth under 10 cm cannot be right.').max(700, 'A girth over 70 cm cannot be right.').nullable();

export const beginAssessmentInput = z.strictObject({ id: z.uuid(), windowReason });

export const saveTrialInput = z.strictObject({
  id: z.uuid(),
  side: z.enum(['left', 'right']),
  trial: z.coerce.number().int().min(1).max(3),
  circumferencesMm: z.array(girthMm).min(2).max(30),
});
export type SaveTrialInput = z.output<typeof saveTrialInput>;

/** Ways of holding the arms beside the protocol's own; one who cannot hold them so is measured another way, and the form says which. */
export const otherPositions = ['supported, 90° forward', 'hanging', 'lying, at the side'] as const;

const ratioWords = ({ input }: { input?: unknown }): string => outsideRatio(Number(input));

export const saveCircumstancesInput = z.strictObject({
  id: z.uuid(),
  position: z.string().trim().min(3, 'Say how the arms were held.').max(80, 'Use at most 80 characters.').nullable(),
  sleeveWorn: z.boolean().nullable(),
  hoursSinceTraining: z.int().min(0).max(999, 'Give the hours as a number up to 999.').nullable(),
  bodyWeightG: z.int().min(30_000, 'Body weight under 30 kg cannot be right.').max(250_000, 'Body weight over 250 kg cannot be right.').nullable(),
  impedanceRatio: z.number().min(0.5, { error: ratioWords }).max(3, { error: ratioWords }).nullable(),
  impedanceRestMin: z.int().min(0).max(120, 'Give the minutes of lying down, 0 to 120.').nullable(),
  remarks: z.string().trim().max(500, 'Use at most 500 characters.').nullable(),
});
export type SaveCircumstancesInput = z.output<typeof saveCircumstancesInput>;

/** A doubtful value that was looked at again and kept, with the reason in the assessor's words. */
export const keptFindingSchema = z.strictObject({
  check: z.string().max(60),
  place: z.string().max(40),
  reason: z.string().trim().min(3, 'Say why it is kept.').max(300, 'Use at most 300 characters.'),
});

export const completeAssessmentInput = z.strictObject({ id: z.uuid(), kept: z.array(keptFindingSchema).max(100) });
export type CompleteAssessmentInput = z.output<typeof completeAssessmentInput>;

/** A girth of a saved trial, in millimetres. */
export const correctedGirth = z.int('A girth is given in whole millimetres.').min(100, 'A girth under 10 cm cannot be right.').max(700, 'A girth over 70 cm cannot be right.');

export const correctValueInput = z.strictObject({
  target: fieldTargetInput,
  value: z.union([z.string().max(500), z.number(), z.boolean(), z.null()]),
  reason: z.string().trim().min(5, 'Say why the value changes.').max(500, 'Use at most 500 characters.'),
  /** Of a girth: the other trial of the same level, and a third reading, where the correction touches them too. */
  also: z.strictObject({ other: correctedGirth.optional(), third: correctedGirth.optional() }).optional(),
  /** Doubts that the new value raises, each with the reason for which it stands. */
  kept: z.array(keptFindingSchema).max(20).optional(),
  /** The query that the correction answers, in the version that was read. */
  query: z.strictObject({ id: z.uuid(), version: z.int() }).optional(),
});
export type CorrectValueInput = z.output<typeof correctValueInput>;
