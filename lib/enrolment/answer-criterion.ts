import { findProtocol } from '@/lib/protocol/find-protocol';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { findScreening, listCriteria, type CriterionView } from './find-screening';

/** Saves one answer of the checklist; a second answer takes the place of the first, and the trail keeps both. */
export async function answerCriterion(work: Work, { id, criterion, answer }: { id: string; criterion: string; answer: 'yes' | 'no' }): Promise<CriterionView> {
  const screening = await findScreening(work, id);
  if (screening.state !== 'screening') throw new Refusal('locked', 'This screening has already ended.');
  if (screening.eligibilityConfirmedAt) throw new Refusal('locked', 'Eligibility is confirmed, so the answers stand.');
  const { document } = await findProtocol(work, screening.protocolVersionId);
  const seen = (await listCriteria(work, id, document)).find(({ key }) => key === criterion);
  if (!seen) throw new Refusal('not-found', 'The protocol has no such criterion.');
  work.expect(seen);
  // Of two answers at one moment the first is kept, and the second finds another version than it saw.
  const written = await work.sql(
    `insert into eligibility_answer (screening_id, site_id, criterion, answer) values (?, ?, ?, ?)
     on conflict (screening_id, criterion) do update set answer = excluded.answer, version = eligibility_answer.version + 1
     where eligibility_answer.version = ? returning id`,
    [id, screening.siteId, criterion, answer, seen.version],
  );
  if (written.length === 0) throw new Refusal('stale', 'Somebody else answered this in the meantime. Load the page again.');
  work.em.clear();
  const saved = (await listCriteria(work, id, document)).find(({ key }) => key === criterion);
  if (!saved) throw new Error('The answer that was just saved is not there.');
  return saved;
}
