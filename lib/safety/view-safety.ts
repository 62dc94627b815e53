import { listFlags, type FlagRow } from '@/lib/training/list-flags';
import type { Work } from '@/lib/work/work';
import { listClosedReports, listOpenReports, type ReportRow } from './list-open-reports';

/** The Safety page: what waits, what training met a rule, what is done. */
export interface SafetyView {
  readonly now: Date;
  readonly open: readonly ReportRow[];
  readonly flags: readonly FlagRow[];
  readonly closed: readonly ReportRow[];
}

export async function viewSafety(work: Work): Promise<SafetyView> {
  return { now: work.now, open: await listOpenReports(work), flags: await listFlags(work), closed: await listClosedReports(work) };
}
