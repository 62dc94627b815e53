import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';

/** A de-identified data set that left the house, with what was removed and the checksums. */
export const ExtractSchema = defineEntity({
  name: 'Extract',
  tableName: 'extract',
  properties: {
    ...base(),
    studyId: p.uuid(),
    number: p.bigint('number').defaultRaw('identity'),
    profile: p.enum(['open', 'controlled']),
    purpose: p.string(),
    recipient: p.string(),
    asOf: p.datetime(),
    state: p.enum(['waiting', 'preparing', 'ready', 'failed']),
    progress: p.integer(),
    files: p.json<ExtractFile[]>(),
    removed: p.json<string[]>(),
    counts: p.json<Record<string, number>>(),
    failure: p.string().nullable(),
    requestedBy: p.uuid(),
    requestedLabel: p.string(),
    requestedAt: p.datetime(),
    readyAt: p.datetime().nullable(),
  },
});
export type Extract = InferEntity<typeof ExtractSchema>;

/** One file of an extract as the ledger keeps it. */
export interface ExtractFile {
  readonly name: string;
  readonly storageKey: string;
  readonly rowCount: number;
  readonly byteCount: number;
  readonly sha256: string;
}
