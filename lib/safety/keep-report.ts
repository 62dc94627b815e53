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

/** What somebody said, and the key their device made for saying it. */
export interface Said {
  readonly answers: Record<string, unknown>;
  readonly noticedOn: string;
  readonly note: string | null;
  readonly clientKey: string;
}

/**
 * The report that already says this under this key, if any: sent twice it is one. Other words under the same key are
 * another report: an answer of ours that got lost must never swallow a graver sign that was added since.
 */
export async function findSentReport(work: Work, own: OwnRecord, { answers, noticedOn, note, clientKey }: Said): Promise<SymptomReport | null> {
  const [found] = await work.sql<{ id: string }>(
    // An arm check is told on the day it is made and again with its session, which may be of the day before.
    `select id from symptom_report where participant_id = ? and client_key = ? and answers = ?::jsonb and (noticed_on = ? or answers ->> 'armCheck' is not null) and note is not distinct from ?`,
    [own.participant.id, clientKey, JSON.stringify(answers), noticedOn, note],
  );
  return found ? work.em.findOne(SymptomReportSchema, { id: found.id }) : null;
}

/** Keeps a report, starts the site's clock from the server's time, holds training where the level asks for it, and has the team written to unless nothing presses. */
export async function keepReport(
  work: Work,
  own: OwnRecord,
  { verdict, ...said }: Said & { verdict: SafetyVerdict },
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
