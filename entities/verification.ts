import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { recordBase } from './columns';

/** A mark that a value was seen at source. It stands on the value and falls (in the data base) when the value changes. */
export const VerificationSchema = defineEntity({
  name: 'Verification',
  tableName: 'verification',
  properties: {
    ...recordBase(),
    visitId: p.uuid().nullable(),
    targetTable: p.string(),
    targetId: p.uuid(),
    field: p.string(),
    value: p.json<unknown>().nullable(),
    verifiedBy: p.uuid(),
    verifiedLabel: p.string(),
    verifiedAt: p.datetime(),
    fellAt: p.datetime().nullable(),
  },
});
export type Verification = InferEntity<typeof VerificationSchema>;
