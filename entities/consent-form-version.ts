import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';

/** A consent form in sections, with its optional permissions. */
export const ConsentFormVersionSchema = defineEntity({
  name: 'ConsentFormVersion',
  tableName: 'consent_form_version',
  properties: {
    ...base(),
    studyId: p.uuid(),
    number: p.string(),
    document: p.json<unknown>(),
    effectiveOn: p.date(),
  },
});
export type ConsentFormVersion = InferEntity<typeof ConsentFormVersionSchema>;
