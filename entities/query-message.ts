import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

/** One turn of a query's thread. Never changed. */
export const QueryMessageSchema = defineEntity({
  name: 'QueryMessage',
  tableName: 'query_message',
  properties: {
    id: p.uuid().primary().defaultRaw('gen_random_uuid()'),
    siteId: p.uuid(),
    participantId: p.uuid(),
    queryId: p.uuid(),
    authorId: p.uuid(),
    authorRole: p.string(),
    authorLabel: p.string(),
    kind: p.enum(['question', 'answer', 'ask again', 'close', 'cancel', 'remind', 'reopen']),
    text: p.string(),
    at: p.datetime(),
  },
});
export type QueryMessage = InferEntity<typeof QueryMessageSchema>;
