import { addDays } from '@/instruments/calendar';
import { DataQuerySchema, type DataQuery } from '@/entities/data-query';
import { currentProtocol } from '@/lib/protocol/find-protocol';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { addMessage } from './add-message';
import type { RaiseQueryInput } from './input';
import { findTarget, type FoundTarget } from './targets';
import { tellSite } from './tell-site';
import { viewQuery, type QueryView } from './view-query';

/** Opens a query on a value; the caller has found the value within reach. */
export async function openQuery(work: Work, target: FoundTarget, question: string, origin: { kind: DataQuery['origin']; checkId: string | null }): Promise<DataQuery> {
  const { document } = await currentProtocol(work);
  const query = work.em.create(DataQuerySchema, {
    siteId: target.siteId,
    participantId: target.participantId,
    visitId: target.visitId,
    targetTable: target.table,
    targetId: target.id,
    field: target.field,
    fieldLabel: target.label,
    origin: origin.kind,
    checkId: origin.checkId,
    state: 'open',
    raisedBy: work.actor.accountId,
    raisedAt: work.now,
    dueOn: addDays(localDate(work.now, 'UTC'), document.queryDueDays),
  });
  await work.em.flush();
  addMessage(work, query, 'question', question);
  await tellSite(work, query);
  return query;
}

/** A monitor asks about one value. The site gets a letter with the code and a link, never the value. */
export async function raiseQuery(work: Work, { target, question }: RaiseQueryInput): Promise<QueryView> {
  const found = await findTarget(work, target);
  const query = await openQuery(work, found, question, { kind: 'manual', checkId: null });
  return viewQuery(work, query.id);
}
