import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { addMessage } from './add-message';
import { findQuery } from './find-query';
import { tellSite } from './tell-site';
import { viewQuery, type QueryView } from './view-query';

/** A reminder to the site; at most one letter a day however often it is pressed. */
export async function remind(work: Work, { id }: { id: string }): Promise<QueryView> {
  const query = await findQuery(work, id);
  if (query.state !== 'open') throw new Refusal('conflict', 'Only a query that waits on the site can be reminded of.');
  addMessage(work, query, 'remind', 'Reminded.');
  await tellSite(work, query, { onceKey: `remind ${id}`, onceSeconds: 86_400 });
  return viewQuery(work, id);
}
