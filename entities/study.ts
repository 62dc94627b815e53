import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';

/** The study: its own time and its target. */
export const StudySchema = defineEntity({
  name: 'Study',
  tableName: 'study',
  properties: {
    ...base(),
    name: p.string(),
    startsOn: p.date(),
    endsOn: p.date(),
    recruitmentTarget: p.integer(),
  },
});
export type Study = InferEntity<typeof StudySchema>;
