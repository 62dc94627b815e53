import type { Metadata } from 'next';
import { Proof } from '@/components/audit/proof';
import { Trail } from '@/components/audit/trail';
import { PageHead } from '@/components/ui/page';
import { listTrailInput } from '@/lib/audit/input';
import { listTrail } from '@/lib/audit/list-trail';
import { viewProof } from '@/lib/audit/view-proof';
import { didWords, tableWords } from '@/lib/audit/words';
import { may } from '@/lib/auth/policy';
import { loadPage, requireActor } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Audit trail' };

const choices = (words: Readonly<Record<string, string>>) =>
  Object.entries(words)
    .map(([value, label]) => ({ value, label }))
    .sort((a, b) => a.label.localeCompare(b.label));

export default async function AuditPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { role } = await requireActor('audit.list');
  const { code, who } = await searchParams;
  const found = listTrailInput.safeParse({ ...(typeof code === 'string' ? { code } : {}), ...(typeof who === 'string' ? { who } : {}) });
  const asked = found.success ? found.data : listTrailInput.parse({});
  const { first, proof } = await loadPage('audit.list', async (work) => ({ first: await listTrail(work, asked), proof: await viewProof(work) }));
  const { before: _before, limit: _limit, ...filter } = asked;
  return (
    <>
      <PageHead title="Audit trail" lede="Who did what, when and why. Nothing here can be changed." />
      <Proof proof={proof} />
      <Trail first={first} asked={filter} acts={choices(didWords).map(({ value, label }) => ({ value, label: `${label} (${value})` }))} tables={choices(tableWords)} mayExport={may(role, 'audit.export')} />
    </>
  );
}
