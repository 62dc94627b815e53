import { Refusal } from '@/lib/work/refusal';
import { secondsAfter } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { addMessage } from './add-message';
import { findQuery } from './find-query';
import { tellSite } from './tell-site';
import { viewQuery, type QueryView } from './view-query';

/** A reminder to the site; once a day however often it is pressed. */
export async function remind(work: Work, { id }: { id: string }): Promise<QueryView> {
  const query = await findQuery(work, id);
  if (query.state !== 'open') throw new Refusal('conflict', 'Only a query that waits on the site can be reminded of.');
  const [today] = await work.sql("select id from query_message where query_id = ? and kind = 'remind' and at > ?", [id, secondsAfter(work.now, -86_400)]);
  if (!today) {
    addMessage(work, query, 'remind', 'Reminded.');
    await tellSite(work, query);
  }
  return viewQuery(work, id);
}
