import { askAgain as reopen } from '@/entities/data-query';
import type { Work } from '@/lib/work/work';
import { addMessage } from './add-message';
import { findQuery } from './find-query';
import { tellSite } from './tell-site';
import { viewQuery, type QueryView } from './view-query';

/** The answer leaves something open: the query waits on the site once more. */
export async function askAgain(work: Work, { id, question }: { id: string; question: string }): Promise<QueryView> {
  const query = await findQuery(work, id);
  const kind = query.state === 'closed' ? 'reopen' : 'ask again';
  reopen(query);
  addMessage(work, query, kind, question);
  await tellSite(work, query);
  return viewQuery(work, id);
}
