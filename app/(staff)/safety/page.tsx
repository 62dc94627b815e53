import type { Metadata } from 'next';
import { FlagList } from '@/components/safety/flag-list';
import { ReportTable } from '@/components/safety/report-table';
import { countOf } from '@/components/ui/format';
import { PageHead } from '@/components/ui/page';
import { may } from '@/lib/auth/policy';
import { viewSafety } from '@/lib/safety/view-safety';
import { loadPage, requireSession } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Safety' };

export default async function SafetyPage() {
  const { actor } = await requireSession();
  const { now, open, flags, closed } = await loadPage('symptom.list', viewSafety);
  const overdue = open.filter(({ isOverdue }) => isOverdue).length;
  return (
    <>
      <PageHead title="Safety" lede={open.length === 0 ? 'No report waits for a review.' : `${countOf(open.length, 'report')} to review${overdue > 0 ? `, ${overdue} past the time` : ''}.`} />
      {open.length > 0 ? (
        <section className="mt-6">
          <ReportTable caption="Reports to review" rows={open} now={now} />
        </section>
      ) : null}
      <section className="mt-10">
        <h2>Training flags</h2>
        <p className="t-small mt-1 text-ink-2">Candidates for the site to judge, safety first. They fall by themselves when a later entry changes what raised them.</p>
        <div className="mt-3">{flags.length > 0 ? <FlagList flags={flags} maySee={may(actor.role, 'flag.see')} /> : <p>Nothing unseen.</p>}</div>
      </section>
      <section className="mt-10">
        <h2>Reviewed, or nothing asked</h2>
        <div className="mt-3">{closed.length > 0 ? <ReportTable caption="Reviewed reports" rows={closed} now={now} /> : <p>None yet.</p>}</div>
      </section>
    </>
  );
}
