import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { answerQuery } from './answer-query';
import { findQuery } from './find-query';
import type { FieldTarget } from './targets';

/**
 * A correction answers the query that asked about the same value, in the version that was read.
 * @throws Refusal 'invalid' when the query asks about another value, 'stale' when it moved on since it was read.
 */
export async function answerByCorrection(work: Work, target: FieldTarget, { id, version }: { id: string; version: number }, reason: string): Promise<void> {
  // If-Match names the version of the corrected row; the query carries its own.
  const ofQuery: Work = { ...work, expect: () => undefined };
  const query = await findQuery(ofQuery, id);
  if (query.targetTable !== target.table || query.targetId !== target.id || query.field !== target.field)
    throw new Refusal('invalid', 'That query asks about another value. Correct this one without it, then answer the query at its own value.', 'query');
  if (query.version !== version) throw new Refusal('stale', 'The query changed in the meantime. Your correction is still here: read the query again, then save.', 'query');
  await answerQuery(ofQuery, { id, answer: `Corrected: ${reason}` });
}
