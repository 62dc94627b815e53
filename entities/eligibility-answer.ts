import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { screeningBase } from './columns';

/** The answer to one criterion of the protocol. */
export const EligibilityAnswerSchema = defineEntity({
  name: 'EligibilityAnswer',
  tableName: 'eligibility_answer',
  properties: {
    ...screeningBase(),
    criterion: p.string(),
    answer: p.enum(['yes', 'no']),
  },
});
export type EligibilityAnswer = InferEntity<typeof EligibilityAnswerSchema>;
