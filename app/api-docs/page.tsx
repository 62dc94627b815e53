import type { Metadata } from 'next';
import { routes } from '@/app/api/routes';
import { PlainShell } from '@/components/shell/plain-shell';
import { PageHead } from '@/components/ui/page';
import { PlainTable } from '@/components/ui/plain-table';
import { ruleOf } from '@/lib/auth/policy';
import { roleNames } from '@/lib/auth/roles';

export const metadata: Metadata = { title: 'API' };
// A page made at build time has no nonce, and its scripts would be refused.
export const dynamic = 'force-dynamic';

const rows = Object.entries(routes)
  .flatMap(([address, methods]) => Object.entries(methods).map(([method, { declaration }]) => ({ address, method, declaration })))
  .sort((a, b) => a.address.localeCompare(b.address) || a.method.localeCompare(b.method));

/** Headers a request of this kind must carry. */
const needs = ({ create, change }: { create?: true; change?: true }): string => (create ? 'Idempotency-Key' : change ? 'If-Match' : 'nothing');

/** Every address of the API, from the same declarations the server answers by. */
export default function ApiDocsPage() {
  return (
    <PlainShell footer={<span>A research record. It does not diagnose, and it does not prescribe exercise.</span>}>
      <PageHead
        title="API"
        lede={
          <>
            Every write of our own screens goes through these addresses. The whole document, with fields, is at{' '}
            <a className="btn-link" href="/api/openapi.json">
              /api/openapi.json
            </a>
            . Refusals are problem details (RFC 9457).
          </>
        }
      />
      <div className="mt-6">
        <PlainTable
          caption="Addresses of the API"
          rows={rows}
          getRowId={({ address, method }) => `${method} ${address}`}
          columns={[
            { id: 'method', header: 'Method', width: '80px', cell: ({ method }) => <b className="t-num">{method}</b> },
            { id: 'address', header: 'Address', cell: ({ address }) => <code className="break-all">{address}</code> },
            { id: 'summary', header: 'Does', cell: ({ declaration }) => declaration.summary },
            { id: 'act', header: 'Act', cell: ({ declaration }) => <code>{declaration.act}</code> },
            { id: 'needs', header: 'Needs', cell: ({ declaration }) => needs(declaration) },
            { id: 'roles', header: 'Who may', cell: ({ declaration }) => (declaration.open ? 'anyone with the link' : ruleOf(declaration.act).roles.map((role) => roleNames[role]).join(', ')) },
          ]}
        />
      </div>
    </PlainShell>
  );
}
