import type { Metadata } from 'next';
import { ExtractList } from '@/components/extracts/extract-list';
import { ButtonLink } from '@/components/ui/button';
import { PageHead } from '@/components/ui/page';
import { may } from '@/lib/auth/policy';
import { listExtracts } from '@/lib/extracts/list-extracts';
import { loadPage, requireActor } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Extracts' };

export default async function ExtractsPage() {
  const actor = await requireActor('extract.list');
  const extracts = await loadPage('extract.list', listExtracts);
  return (
    <>
      <PageHead
        title="Extracts"
        lede="De-identified data sets that were asked for, with what was left out and the checksum of every file."
        actions={may(actor.role, 'extract.request') ? <ButtonLink kind="primary" href="/extracts/new">Ask for an extract</ButtonLink> : null}
      />
      <section className="mt-6">
        <ExtractList extracts={extracts} />
      </section>
    </>
  );
}
