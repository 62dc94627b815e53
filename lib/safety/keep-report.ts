import { SymptomReportSchema, type SymptomReport } from '@/entities/symptom-report';
import { type SafetyVerdict, safetyVerdict } from '@/instruments/safety/judge-symptom-report';
import { reportsWaiting } from '@/lib/jobs/handlers/reports-waiting';
import type { OwnRecord } from '@/lib/people/find-own-record';
import type { Work } from '@/lib/work/work';
import { dueAt } from './due-at';
import { settleHold } from '@/lib/measurement/settle-hold';

/** What the participant reads once a report is in. */
export interface SentReport {
  readonly id: string;
  readonly level: SymptomReport['level'];
  readonly title: string;
  readonly text: string;
  readonly urgency: SafetyVerdict['urgency'];
  /** By when the site answers; ISO, null when nothing is asked of it. */
  readonly dueAt: string | null;
  readonly holdTraining: boolean;
  readonly site: { readonly name: string; readonly phone: string; readonly timeZone: string };
}

/** The report as its sender reads it. */
export function toSentReport(report: SymptomReport, { site }: OwnRecord): SentReport {
  const { participantTitle, participantText, urgency } = safetyVerdict(report.level);
  return { id: report.id, level: report.level, title: participantTitle, text: participantText, urgency, dueAt: report.dueAt?.toISOString() ?? null, holdTraining: report.holdTraining, site };
}

/** The report that was already sent under this key, if any: sent twice it is one. */
export const findSentReport = (work: Work, own: OwnRecord, clientKey: string): Promise<SymptomReport | null> =>
  work.em.findOne(SymptomReportSchema, { participantId: own.participant.id, clientKey });

/** Keeps a report, starts the site's clock from the server's time, holds training where the level asks for it, and has the team written to unless nothing presses. */
export async function keepReport(
  work: Work,
  own: OwnRecord,
  { verdict, ...said }: { verdict: SafetyVerdict; answers: Record<string, unknown>; noticedOn: string; note: string | null; clientKey: string },
): Promise<SymptomReport> {
  const report = work.em.create(SymptomReportSchema, {
    siteId: own.participant.siteId,
    participantId: own.participant.id,
    reportedAt: work.now,
    level: verdict.level,
    dueAt: dueAt(verdict.siteDeadline, work.now, own.site.timeZone),
    holdTraining: verdict.holdTraining,
    state: 'new',
    ...said,
  });
  await settleHold(work, own.participant.id);
  if (verdict.urgency !== 'none') await work.later(reportsWaiting, { siteId: report.siteId, reportId: report.id });
  return report;
}
