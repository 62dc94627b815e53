import { answerQuery as answer } from '@/entities/data-query';
import type { Work } from '@/lib/work/work';
import { addMessage } from './add-message';
import { findQuery } from './find-query';
import { viewQuery, type QueryView } from './view-query';

/** The site answers. Only the asker closes. */
export async function answerQuery(work: Work, input: { id: string; answer: string }): Promise<QueryView> {
  const query = await findQuery(work, input.id);
  answer(query, work.now);
  addMessage(work, query, 'answer', input.answer);
  return viewQuery(work, query.id);
}
