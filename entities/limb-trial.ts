import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { integers, recordBase } from './columns';

/** One pass of the tape over one arm, wrist upward. Millimetres, so that a threshold is met exactly or not. */
export const LimbTrialSchema = defineEntity({
  name: 'LimbTrial',
  tableName: 'limb_trial',
  properties: {
    ...recordBase(),
    assessmentId: p.uuid(),
    side: p.enum(['left', 'right']),
    trial: p.integer(),
    circumferencesMm: integers(),
    savedAt: p.datetime(),
  },
});
export type LimbTrial = InferEntity<typeof LimbTrialSchema>;
