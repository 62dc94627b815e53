import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { recordBase } from './columns';
import { lawful } from './lawful';

/** A change in the arm that a participant reports, with the clock it starts at the site. */
export const SymptomReportSchema = defineEntity({
  name: 'SymptomReport',
  tableName: 'symptom_report',
  properties: {
    ...recordBase(),
    reportedAt: p.datetime(),
    noticedOn: p.date(),
    answers: p.json<Record<string, unknown>>(),
    level: p.enum(['S0', 'S1', 'S2', 'S3', 'R1', 'R1+', 'R2', 'R3', 'R4']),
    note: p.string().nullable(),
    dueAt: p.datetime().nullable(),
    holdTraining: p.boolean(),
    state: p.enum(['new', 'read', 'reviewed']),
    readAt: p.datetime().nullable(),
    reviewedAt: p.datetime().nullable(),
    reviewedBy: p.uuid().nullable(),
    outcome: p.enum(['no action', 'advice', 'unscheduled visit', 'adverse event']).nullable(),
    reviewNote: p.string().nullable(),
    clientKey: p.uuid(),
    /** When letters about it were put in the queue, each kind once; by jobs only. */
    waitingLettersAt: p.datetime().nullable(),
    overdueLettersAt: p.datetime().nullable(),
  },
});
export type SymptomReport = InferEntity<typeof SymptomReportSchema>;

/** Somebody at the site has read the report. */
export function readReport(report: SymptomReport, at: Date): void {
  if (report.state !== 'new') return;
  report.state = 'read';
  report.readAt = at;
}

/** The review ends in an outcome. */
export function reviewReport(report: SymptomReport, review: { outcome: NonNullable<SymptomReport['outcome']>; note: string; by: string; at: Date }): void {
  lawful(report.state !== 'reviewed', 'This report has already been reviewed.');
  report.state = 'reviewed';
  report.outcome = review.outcome;
  report.reviewNote = review.note;
  report.reviewedBy = review.by;
  report.reviewedAt = review.at;
  report.readAt ??= review.at;
}
