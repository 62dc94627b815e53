import { z } from 'zod';
import { swellingCodes } from '@/instruments/swelling';

/** The protocol as data: what a version in the data base holds. Every number a screen or a rule uses stands here. */
const key = z.string().regex(/^[a-z0-9-]+$/);
const days = z.int().min(0).max(400);

export const criterionSchema = z.strictObject({
  key,
  text: z.string(),
  /** The answer that lets a person in. */
  lets: z.enum(['yes', 'no']),
});

export const scheduledVisitSchema = z.strictObject({
  key,
  name: z.string(),
  /** Days from the anchor to the target date. */
  offsetDays: z.int().min(-400).max(4000),
  earlyDays: days,
  lateDays: days,
  /** Keys of the questionnaires due with the visit. */
  questionnaires: z.array(key),
});

export const protocolSchema = z.strictObject({
  cohorts: z.array(z.strictObject({ key, name: z.string() })).min(1),
  eligibility: z.array(criterionSchema).min(1),
  /** Days between surgery and enrolment, at least; the criterion in words and this figure are set together. */
  daysSinceSurgery: days.default(0),
  /** What day zero is. */
  anchor: z.enum(['enrolment', 'surgery', 'first session']),
  visits: z.array(scheduledVisitSchema).min(1),
  measurement: z.strictObject({
    method: z.enum(['frustum', 'disk']),
    startOffsetMm: z.int(),
    stepMm: z.int().positive(),
    levelCount: z.int().min(2).max(30),
    /** Two readings of one level further apart than this need a third. */
    toleranceMm: z.int().positive(),
    position: z.string(),
    /** Standard error of one arm's volume in percent, until the registry has its own. */
    semPct: z.number().positive(),
  }),
  swelling: z.strictObject({ primary: z.enum(swellingCodes), alternatives: z.array(z.enum(swellingCodes)), earlyExclusionDays: days, impedanceCutoffs: z.enum(['2001-3sd', '2011-2sd', '2011-3sd', '2018-2sd', '2018-3sd']) }),
  training: z.strictObject({
    startKg: z.number(),
    startFromKg: z.number(),
    weeklyStepKg: z.number(),
    jumpKg: z.number(),
    breakDays: z.int(),
    resumeFromFraction: z.number(),
    resumeToFraction: z.number(),
    toleranceKg: z.number(),
    incrementKg: z.number(),
    shortBreakDays: z.int().nullable(),
    minDaysSinceRaise: z.int().nullable(),
    minSessionsAtLoad: z.int().nullable(),
  }),
  /** Exercises of the programme, by code, in the order the phone asks for them. */
  exercises: z.array(z.string()).min(1),
  sessionsPerWeek: z.int().min(1).max(7),
  /** Hours after the local end of a session's day in which it may still be entered without a 'late' mark. */
  lateAfterHours: z.int(),
  /** Days until a data query is due. */
  queryDueDays: z.int(),
});
export type ProtocolDocument = z.infer<typeof protocolSchema>;
export type ScheduledVisit = z.infer<typeof scheduledVisitSchema>;

export const consentSectionSchema = z.strictObject({ key, title: z.string(), paragraphs: z.array(z.string()).min(1), newSince: z.string().optional() });
export const consentFormSchema = z.strictObject({
  title: z.string(),
  /** Key information first. */
  sections: z.array(consentSectionSchema).min(1),
  /** What must be agreed to take part. */
  statements: z.array(z.strictObject({ key, text: z.string() })).min(1),
  /** Choices; the study goes on either way. */
  permissions: z.array(z.strictObject({ key, text: z.string() })),
});
export type ConsentForm = z.infer<typeof consentFormSchema>;
