import type { Metadata } from 'next';
import { ProtocolWords } from '@/components/protocol/protocol-words';
import { formatDate } from '@/components/ui/format';
import { Versions } from '@/components/ui/ledger';
import { Columns, MarginPart, PageHead } from '@/components/ui/page';
import { viewProtocol } from '@/lib/protocol/view-protocol';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Protocol' };

export default async function ProtocolPage() {
  const view = await loadPage('protocol.view', viewProtocol);
  return (
    <>
      <PageHead title="Protocol" beside={`version ${view.number}`} lede={`In force since ${formatDate(view.effectiveOn)}. Every record remembers the version it was made under.`} />
      <Columns
        marginLabel="Versions"
        margin={
          <MarginPart title="Versions">
            <Versions label="Versions of the protocol" versions={view.versions.map(({ id, number, reason, effectiveOn }) => ({ key: id, title: `Version ${number}`, when: formatDate(effectiveOn), children: reason }))} />
          </MarginPart>
        }
      >
        <ProtocolWords view={view} />
      </Columns>
    </>
  );
}
