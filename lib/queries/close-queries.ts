import { DataQuerySchema, closeQuery } from '@/entities/data-query';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { addMessage } from './add-message';

/** Closes several answered queries for one reason: all of them or none. */
export async function closeQueries(work: Work, { ids, reason }: { ids: readonly string[]; reason: string }): Promise<{ closed: number }> {
  const queries = await work.em.find(DataQuerySchema, { id: { $in: [...ids] } });
  if (queries.length !== new Set(ids).size) throw new Refusal('not-found', 'One of these queries is not in your reach.');
  for (const query of queries) {
    closeQuery(query, work.now);
    addMessage(work, query, 'close', reason);
  }
  return { closed: queries.length };
}
