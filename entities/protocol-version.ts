import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';

/** The protocol as data. Records remember the version they were made under. */
export const ProtocolVersionSchema = defineEntity({
  name: 'ProtocolVersion',
  tableName: 'protocol_version',
  properties: {
    ...base(),
    studyId: p.uuid(),
    number: p.string(),
    document: p.json<unknown>(),
    reason: p.string(),
    effectiveOn: p.date(),
  },
});
export type ProtocolVersion = InferEntity<typeof ProtocolVersionSchema>;
