import { DataQuerySchema, type DataQuery } from '@/entities/data-query';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** A query to be changed, in the version the caller saw. @throws Refusal 'not-found' out of reach, 'stale' when changed since. */
export async function findQuery(work: Work, id: string): Promise<DataQuery> {
  const query = await work.em.findOne(DataQuerySchema, { id });
  if (!query) throw new Refusal('not-found', 'There is no such query in your reach.');
  work.expect(query);
  return query;
}
