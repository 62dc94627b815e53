import { reviewReport as review } from '@/entities/symptom-report';
import { plainDate } from '@/lib/people/plain-date';
import { addUnscheduledVisit } from '@/lib/schedule/add-unscheduled-visit';
import { timeZoneOf } from '@/lib/schedule/view-visit';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { findReport } from './find-report';
import type { ReviewReportInput } from './input';
import { settleHold } from '@/lib/measurement/settle-hold';
import { viewReport, type ReportView } from './view-report';

/**
 * The review ends in an outcome. An unscheduled visit is added to the schedule at once; the hold on training is settled.
 * @throws Refusal 'conflict' when it was reviewed before, 'stale' when somebody else opened it since, 'invalid' without a day for the visit.
 */
export async function reviewReport(work: Work, { id, outcome, note, visitOn }: ReviewReportInput): Promise<ReportView> {
  const report = await findReport(work, id);
  work.expect(report);
  review(report, { outcome, note, by: work.actor.accountId, at: work.now });
  if (outcome === 'unscheduled visit') {
    if (!visitOn) throw new Refusal('invalid', 'Give the day of the unscheduled visit.', 'visitOn');
    if (visitOn < localDate(work.now, await timeZoneOf(work, report.siteId))) throw new Refusal('invalid', `${plainDate(visitOn)} has passed. Give a day from today on.`, 'visitOn');
    await addUnscheduledVisit(work, { participantId: report.participantId, on: visitOn, why: `Symptom report: ${note}`.slice(0, 300) });
  }
  await settleHold(work, report.participantId);
  return viewReport(work, { id });
}
