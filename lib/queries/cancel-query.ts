import { cancelQuery as cancel } from '@/entities/data-query';
import type { Work } from '@/lib/work/work';
import { addMessage } from './add-message';
import { findQuery } from './find-query';
import { viewQuery, type QueryView } from './view-query';

/** The asker takes the question back, and says why. */
export async function cancelQuery(work: Work, { id, reason }: { id: string; reason: string }): Promise<QueryView> {
  const query = await findQuery(work, id);
  cancel(query, work.now);
  addMessage(work, query, 'cancel', reason);
  return viewQuery(work, id);
}
