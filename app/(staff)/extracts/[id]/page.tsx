import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { ExtractMargin } from '@/components/extracts/extract-margin';
import { ExtractProgress } from '@/components/extracts/extract-progress';
import { FilesTable } from '@/components/extracts/files-table';
import { Columns, PageHead } from '@/components/ui/page';
import { may } from '@/lib/auth/policy';
import { extractId } from '@/lib/extracts/input';
import { viewExtract } from '@/lib/extracts/view-extract';
import { loadPage, requireActor } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Extract' };

export default async function ExtractPage({ params }: { params: Promise<{ id: string }> }) {
  const actor = await requireActor('extract.view');
  const asked = extractId.safeParse(await params);
  if (!asked.success) notFound();
  const extract = await loadPage('extract.view', (work) => viewExtract(work, asked.data));
  return (
    <>
      <PageHead title={`Extract ${extract.number}`} crumbs={[{ label: 'Extracts', href: '/extracts' }, { label: String(extract.number) }]} lede={`For ${extract.recipient}, under the ${extract.profile} profile.`} />
      <Columns marginLabel="About this extract" margin={<ExtractMargin extract={extract} />}>
        <ExtractProgress key={extract.version} first={extract} mayRetry={may(actor.role, 'extract.request')} />
        {extract.state === 'ready' ? (
          <section className="mt-8">
            <h2 className="mb-2">Files</h2>
            <FilesTable extract={extract} mayDownload={may(actor.role, 'extract.download')} />
            <p className="t-small mt-3 text-ink-2">Each saving is written to the audit trail. To check a saved file, compare its SHA-256 with the one here or in checksums.txt.</p>
          </section>
        ) : null}
      </Columns>
    </>
  );
}
