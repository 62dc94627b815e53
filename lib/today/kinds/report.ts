import { safetyLevels, safetyVerdict, type SafetyLevel } from '@/instruments/safety/judge-symptom-report';
import { reportWords } from '@/lib/safety/report-words';
import { moment } from '@/lib/work/time';
import { defineWorkKind, type WorkCommon } from '../work-kind';

export interface ReportWork extends WorkCommon {
  readonly kind: 'report';
  readonly said: string;
  readonly state: 'new' | 'read';
  readonly reportedAt: string;
  readonly reportedOn: string;
  /** By when the site must have reviewed it, and whether that moment is gone. */
  readonly dueAt: string;
  readonly isOverdue: boolean;
  readonly holdTraining: boolean;
}

interface Row extends Pick<ReportWork, 'id' | 'state' | 'reportedAt' | 'reportedOn' | 'dueAt' | 'isOverdue' | 'holdTraining'> {
  readonly answers: unknown;
}

const isUrgent = (level: SafetyLevel): boolean => ['emergency now', 'same-day care'].includes(safetyVerdict(level).urgency);
const urgentLevels = safetyLevels.filter(isUrgent).map((level) => `'${level}'`).join(', ');

/** Reports that wait for a review and have a clock running. One whose clock ran out earlier today is late, not due. */
export const reportWork = defineWorkKind<ReportWork, Row>({
  kind: 'report',
  keys: `select r.id, r.site_id, p.code, (r.due_at at time zone s.time_zone)::date as due_on, r.due_at as at, 0 as tie,
      case when r.state = 'new' and r.level in (${urgentLevels}) then 'urgent' when r.due_at < s.now then 'late' end as standing
    from symptom_report r join participant p on p.id = r.participant_id join site_day s on s.id = r.site_id
    where r.state <> 'reviewed' and r.due_at is not null`,
  details: `select r.id, r.answers, r.state, r.reported_at::text as "reportedAt", (r.reported_at at time zone s.time_zone)::date::text as "reportedOn",
      r.due_at::text as "dueAt", r.due_at < s.now as "isOverdue", r.hold_training as "holdTraining"
    from asked join symptom_report r on r.id = asked.id join site_day s on s.id = r.site_id`,
  item: ({ answers, reportedAt, dueAt, ...row }, common) => ({
    ...common,
    ...row,
    kind: 'report',
    said: reportWords(answers),
    reportedAt: moment(reportedAt).toISOString(),
    dueAt: moment(dueAt).toISOString(),
  }),
});
