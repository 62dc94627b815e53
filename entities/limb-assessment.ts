import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { recordBase } from './columns';

/** One sitting with tape, ratio and weight. Results are stored with the version of the formula. */
export const LimbAssessmentSchema = defineEntity({
  name: 'LimbAssessment',
  tableName: 'limb_assessment',
  properties: {
    ...recordBase(),
    visitId: p.uuid(),
    assessorId: p.uuid(),
    measuredAt: p.datetime(),
    position: p.string().nullable(),
    sleeveWorn: p.boolean().nullable(),
    hoursSinceTraining: p.integer().nullable(),
    method: p.string(),
    startOffsetMm: p.integer(),
    stepMm: p.integer(),
    levelCount: p.integer(),
    toleranceMm: p.integer(),
    state: p.enum(['open', 'complete']),
    bodyWeightG: p.integer().nullable(),
    impedanceRatio: p.decimal('number').nullable(),
    impedanceRestMin: p.integer().nullable(),
    remarks: p.string().nullable(),
    leftVolumeMl: p.decimal('number').nullable(),
    rightVolumeMl: p.decimal('number').nullable(),
    rvc: p.decimal('number').nullable(),
    verdicts: p.json<Record<string, unknown>>(),
    findings: p.json<unknown[]>(),
    formulaVersion: p.string().nullable(),
    completedAt: p.datetime().nullable(),
  },
});
export type LimbAssessment = InferEntity<typeof LimbAssessmentSchema>;
