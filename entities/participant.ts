import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';

/** The participant by code; everything recorded hangs on it. */
export const ParticipantSchema = defineEntity({
  name: 'Participant',
  tableName: 'participant',
  properties: {
    ...base(),
    siteId: p.uuid(),
    code: p.string(),
    number: p.integer(),
    cohort: p.string(),
    affectedSide: p.enum(['left', 'right']),
    dominantSide: p.enum(['left', 'right', 'both']),
    ageYears: p.integer(),
    heightMm: p.integer().nullable(),
    surgeryOn: p.date(),
    surgery: p.string(),
    axillaryProcedure: p.string(),
    nodesRemoved: p.integer().nullable(),
    radiotherapy: p.string(),
    systemicTherapy: p.string(),
    enrolledOn: p.date(),
    anchorOn: p.date(),
    state: p.enum(['enrolled', 'withdrawn', 'completed']),
    leftOn: p.date().nullable(),
    leftGrade: p.enum(['stops training', 'no visits', 'no further data']).nullable(),
    leftReason: p.string().nullable(),
    trainingHeld: p.boolean(),
    protocolVersionId: p.uuid(),
  },
});
export type Participant = InferEntity<typeof ParticipantSchema>;
