import { confirmEligibility as confirm } from '@/entities/screening';
import { findProtocol } from '@/lib/protocol/find-protocol';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { findScreening, listCriteria } from './find-screening';

/**
 * Confirms that every criterion lets the person in; who and when is kept.
 * @throws Refusal 'invalid' that names what is unanswered, or the criterion that stops it.
 */
export async function confirmEligibility(work: Work, { id }: { id: string }): Promise<{ version: number; confirmedAt: Date; confirmedBy: string }> {
  const screening = await findScreening(work, id);
  work.expect(screening);
  const { document } = await findProtocol(work, screening.protocolVersionId);
  const criteria = await listCriteria(work, id, document);
  const open = criteria.filter(({ answer }) => answer === null);
  if (open[0]) throw new Refusal('invalid', open.length === 1 ? `Not answered yet: ${open[0].text}.` : `${open.length} criteria are not answered yet, the first: ${open[0].text}.`, `criterion-${open[0].key}`);
  const stopping = criteria.filter(({ stops }) => stops);
  if (stopping[0]) throw new Refusal('invalid', `Not eligible. ‘${stopping[0].text}’ is answered ${stopping[0].answer}, and the protocol asks for ${stopping[0].lets}.`, `criterion-${stopping[0].key}`);
  confirm(screening, work.actor.accountId, work.now);
  await work.em.flush();
  return { version: screening.version, confirmedAt: work.now, confirmedBy: work.actor.label };
}
