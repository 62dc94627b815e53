import type { DataQuery } from '@/entities/data-query';
import { QueryMessageSchema, type QueryMessage } from '@/entities/query-message';
import type { Work } from '@/lib/work/work';

/** One more turn of the thread, signed by who acts. */
export function addMessage(work: Work, query: DataQuery, kind: QueryMessage['kind'], text: string): void {
  work.em.create(QueryMessageSchema, {
    siteId: query.siteId,
    participantId: query.participantId,
    queryId: query.id,
    authorId: work.actor.accountId,
    authorRole: work.actor.role,
    authorLabel: work.actor.label,
    kind,
    text,
    at: work.now,
  });
}
