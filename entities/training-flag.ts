import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { recordBase } from './columns';

/** A training rule that a session met: a candidate for the site, advice for the participant. Never deleted, only withdrawn. */
export const TrainingFlagSchema = defineEntity({
  name: 'TrainingFlag',
  tableName: 'training_flag',
  properties: {
    ...recordBase(),
    sessionId: p.uuid(),
    flagKey: p.string(),
    rule: p.string(),
    exercise: p.string().nullable(),
    detail: p.json<Record<string, unknown>>(),
    state: p.enum(['raised', 'withdrawn', 'seen']),
    raisedAt: p.datetime(),
  },
});
export type TrainingFlag = InferEntity<typeof TrainingFlagSchema>;
