import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { z } from 'zod';
import { MarkRead } from '@/components/safety/mark-read';
import { ReportPaper } from '@/components/safety/report-paper';
import { ReviewForm } from '@/components/safety/review-form';
import { PageHead } from '@/components/ui/page';
import { may } from '@/lib/auth/policy';
import { viewReport } from '@/lib/safety/view-report';
import { loadPage, requireSession } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Symptom report' };

export default async function ReportPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params;
  if (!z.uuid().safeParse(id).success) notFound();
  const { actor } = await requireSession();
  const report = await loadPage('symptom.view', (work) => viewReport(work, { id }));
  const mayReview = may(actor.role, 'symptom.review') && report.state !== 'reviewed';
  return (
    <>
      <PageHead crumbs={[{ label: 'Safety', href: '/safety' }, { label: report.participantCode }]} title={`Report of ${report.participantCode}`} lede={report.said} />
      {report.state === 'new' && may(actor.role, 'symptom.read') ? <MarkRead id={id} /> : null}
      <ReportPaper report={report} />
      {mayReview ? (
        <section className="mt-8">
          <h2>Review</h2>
          <ReviewForm id={id} version={report.version} today={report.today} holds={report.trainingHeld} />
        </section>
      ) : null}
    </>
  );
}
