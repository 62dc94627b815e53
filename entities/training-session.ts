import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { recordBase } from './columns';

/** A training session as the participant tells it, true whatever the rules say. */
export const TrainingSessionSchema = defineEntity({
  name: 'TrainingSession',
  tableName: 'training_session',
  properties: {
    ...recordBase(),
    localOn: p.date(),
    timeZone: p.string(),
    enteredAt: p.datetime(),
    late: p.boolean(),
    armCheck: p.enum(['the same', 'a little fuller', 'clearly fuller', 'not sure']),
    soreness: p.enum(['no', 'a little', 'a lot']),
    effort: p.integer().nullable(),
    note: p.string().nullable(),
    clientKey: p.uuid(),
  },
});
export type TrainingSession = InferEntity<typeof TrainingSessionSchema>;
