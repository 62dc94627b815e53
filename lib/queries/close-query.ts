import { closeQuery as close } from '@/entities/data-query';
import type { Work } from '@/lib/work/work';
import { addMessage } from './add-message';
import { findQuery } from './find-query';
import { viewQuery, type QueryView } from './view-query';

/** The asker accepts the answer. */
export async function closeQuery(work: Work, { id, note }: { id: string; note?: string | undefined }): Promise<QueryView> {
  const query = await findQuery(work, id);
  close(query, work.now);
  addMessage(work, query, 'close', note || 'Accepted.');
  return viewQuery(work, id);
}
