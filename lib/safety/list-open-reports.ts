import type { SymptomReport } from '@/entities/symptom-report';
import { type SafetyLevel, safetyVerdict, type SafetyVerdict } from '@/instruments/safety/judge-symptom-report';
import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { reportWords } from './report-words';

/** A symptom report in a list. Moments are ISO strings. */
export interface ReportRow {
  readonly id: string;
  readonly participantId: string;
  readonly participantCode: string;
  readonly siteName: string;
  readonly timeZone: string;
  readonly level: SafetyLevel;
  readonly urgency: SafetyVerdict['urgency'];
  readonly said: string;
  readonly reportedAt: string;
  readonly dueAt: string | null;
  /** The site's time has run out and the review has not ended. */
  readonly isOverdue: boolean;
  readonly state: SymptomReport['state'];
  readonly outcome: SymptomReport['outcome'] | null;
  readonly holdTraining: boolean;
  readonly version: number;
}

interface Row extends Omit<ReportRow, 'urgency' | 'said' | 'isOverdue'> {
  answers: unknown;
}

const select = `select r.id, r.participant_id as "participantId", p.code as "participantCode", s.name as "siteName", s.time_zone as "timeZone", r.level, r.answers,
    r.reported_at::text as "reportedAt", r.due_at::text as "dueAt", r.state, r.outcome, r.hold_training as "holdTraining", r.version
  from symptom_report r join participant p on p.id = r.participant_id join site s on s.id = r.site_id`;

const toRow = ({ answers, reportedAt, dueAt, ...row }: Row, now: Date): ReportRow => ({
  ...row,
  urgency: safetyVerdict(row.level).urgency,
  said: reportWords(answers),
  reportedAt: moment(reportedAt).toISOString(),
  dueAt: dueAt === null ? null : moment(dueAt).toISOString(),
  isOverdue: row.state !== 'reviewed' && dueAt !== null && moment(dueAt) < now,
});

/** Reports in reach that wait for a review and have a clock running, the first due first. */
export async function listOpenReports(work: Work): Promise<ReportRow[]> {
  const rows = await work.sql<Row>(`${select} where r.state <> 'reviewed' and r.due_at is not null order by r.due_at, r.id`);
  return rows.map((row) => toRow(row, work.now));
}

/** Everything else in reach, the newest first: reviewed, or nothing asked of the site. */
export async function listClosedReports(work: Work, limit = 60): Promise<ReportRow[]> {
  const rows = await work.sql<Row>(`${select} where r.state = 'reviewed' or r.due_at is null order by r.reported_at desc, r.id limit ?`, [limit]);
  return rows.map((row) => toRow(row, work.now));
}
