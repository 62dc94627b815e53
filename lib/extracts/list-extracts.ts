import { ExtractSchema } from '@/entities/extract';
import type { Work } from '@/lib/work/work';
import { toExtractView, type ExtractView } from './view-extract';

/** The ledger shows this many; older ones keep their addresses. */
const most = 200;

/** Every extract that was asked for, newest first. */
export async function listExtracts(work: Work): Promise<ExtractView[]> {
  const extracts = await work.em.find(ExtractSchema, {}, { orderBy: { requestedAt: 'desc', id: 'desc' }, limit: most });
  return extracts.map(toExtractView);
}
