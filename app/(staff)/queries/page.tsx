import type { Metadata } from 'next';
import { QueriesList } from '@/components/queries/queries-list';
import { PageHead } from '@/components/ui/page';
import { may } from '@/lib/auth/policy';
import { currentProtocol } from '@/lib/protocol/find-protocol';
import { listQueriesInput } from '@/lib/queries/input';
import { listQueries } from '@/lib/queries/list-queries';
import { loadPage, requireSession } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Queries' };

export default async function Page() {
  const { first, limitDays } = await loadPage('query.list', async (work) => ({
    first: await listQueries(work, listQueriesInput.parse({})),
    limitDays: (await currentProtocol(work)).document.queryDueDays,
  }));
  const { actor } = await requireSession();
  return (
    <>
      <PageHead title="Queries" />
      <QueriesList first={first} limitDays={limitDays} mayClose={may(actor.role, 'query.close')} />
    </>
  );
}
