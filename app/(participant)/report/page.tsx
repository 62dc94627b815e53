import type { Metadata } from 'next';
import { ReportSymptoms } from '@/components/phone/report-symptoms';
import { viewOwnShell } from '@/lib/training/view-own-shell';
import { loadPage } from '@/lib/web/session';

export const metadata: Metadata = { title: 'Tell us of a change' };

export default async function ReportPage() {
  const { today, site } = await loadPage('week.view', viewOwnShell);
  return <ReportSymptoms today={today} site={site} />;
}
