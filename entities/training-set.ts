import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

/** Sets of one exercise at one load. The load is kept as typed and in whole grams. */
export const TrainingSetSchema = defineEntity({
  name: 'TrainingSet',
  tableName: 'training_set',
  properties: {
    id: p.uuid().primary().defaultRaw('gen_random_uuid()'),
    siteId: p.uuid(),
    participantId: p.uuid(),
    sessionId: p.uuid(),
    sequence: p.integer(),
    exercise: p.string(),
    equipment: p.string(),
    basis: p.string(),
    side: p.enum(['left', 'right', 'both']),
    loadTyped: p.decimal('number'),
    unit: p.enum(['kg', 'lb']),
    loadG: p.integer(),
    repetitions: p.integer(),
    setCount: p.integer(),
    effort: p.integer().nullable(),
    alreadyLifted: p.boolean(),
  },
});
export type TrainingSet = InferEntity<typeof TrainingSetSchema>;
