import { askAgain } from '@/entities/extract';
import { extractPrepare } from '@/lib/jobs/handlers/extract-prepare';
import type { Work } from '@/lib/work/work';
import { findExtract, toExtractView, type ExtractView } from './view-extract';

/** Sends a failed extract to be prepared once more. */
export async function retryExtract(work: Work, { id }: { id: string }): Promise<ExtractView> {
  const extract = await findExtract(work, id);
  work.expect(extract);
  askAgain(extract);
  await work.em.flush();
  await work.later(extractPrepare, { extractId: extract.id });
  return toExtractView(extract);
}
