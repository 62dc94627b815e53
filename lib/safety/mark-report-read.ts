import { readReport } from '@/entities/symptom-report';
import type { Work } from '@/lib/work/work';
import { findReport } from './find-report';
import { viewReport, type ReportView } from './view-report';

/** Somebody of the site has opened the report. A second reading changes nothing. */
export async function markReportRead(work: Work, { id }: { id: string }): Promise<ReportView> {
  readReport(await findReport(work, id), work.now);
  return viewReport(work, { id });
}
