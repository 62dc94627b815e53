import { ExtractSchema } from '@/entities/extract';
import { extractPrepare } from '@/lib/jobs/handlers/extract-prepare';
import type { Work } from '@/lib/work/work';
import type { RequestExtractInput } from './input';
import { toExtractView, type ExtractView } from './view-extract';

/** Asks for a data set: the row of the ledger and the job that fills it are kept together or not at all. */
export async function requestExtract(work: Work, { profile, purpose, recipient }: RequestExtractInput): Promise<ExtractView> {
  const [study] = await work.sql<{ id: string }>('select id from study limit 1');
  const extract = work.em.create(ExtractSchema, {
    studyId: work.actor.studyId ?? study?.id ?? '',
    profile,
    purpose,
    recipient,
    asOf: work.now,
    state: 'waiting',
    progress: 0,
    files: [],
    removed: [],
    counts: {},
    requestedBy: work.actor.accountId,
    requestedLabel: work.actor.label,
    requestedAt: work.now,
  });
  await work.em.flush();
  await work.em.refresh(extract);
  await work.later(extractPrepare, { extractId: extract.id });
  return toExtractView(extract);
}
