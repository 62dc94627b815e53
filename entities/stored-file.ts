import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

/** A file in the file store: a signed consent form, or the copy that was mailed. Holds names, so it is identity data. */
export const StoredFileSchema = defineEntity({
  name: 'StoredFile',
  tableName: 'stored_file',
  properties: {
    id: p.uuid().primary().defaultRaw('gen_random_uuid()'),
    siteId: p.uuid(),
    screeningId: p.uuid(),
    participantId: p.uuid().nullable(),
    storageKey: p.string(),
    kind: p.enum(['signed consent', 'consent copy']),
    contentType: p.string(),
    byteCount: p.integer(),
    sha256: p.string(),
    createdAt: p.datetime(),
  },
});
export type StoredFile = InferEntity<typeof StoredFileSchema>;
