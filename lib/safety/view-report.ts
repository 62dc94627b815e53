import { judgeArmCheck } from '@/instruments/safety/judge-arm-check';
import { judgeSymptomReport, safetyVerdict, type SafetyVerdict } from '@/instruments/safety/judge-symptom-report';
import { reportedSigns } from '@/instruments/safety/symptom-report';
import { armCheckCode, isArmCheckWords } from '@/lib/training/arm-check-words';
import type { SymptomReport } from '@/entities/symptom-report';
import type { Work } from '@/lib/work/work';
import { localDate } from '@/lib/work/time';
import { keptAnswers } from './answers';
import { findReport } from './find-report';
import { reportWords } from './report-words';

/** One report as the site reads it. Moments are ISO strings. */
export interface ReportView {
  readonly id: string;
  readonly participantId: string;
  readonly participantCode: string;
  readonly siteName: string;
  readonly timeZone: string;
  readonly today: string;
  readonly affectedSide: 'left' | 'right';
  readonly level: SymptomReport['level'];
  readonly urgency: SafetyVerdict['urgency'];
  readonly siteText: string;
  readonly toldParticipant: string;
  readonly measureWithin: SafetyVerdict['measureWithin'];
  readonly adverseEvent: SafetyVerdict['adverseEvent'];
  readonly said: string;
  readonly signs: readonly string[];
  readonly noticedOn: string;
  readonly note: string | null;
  readonly reportedAt: string;
  readonly dueAt: string | null;
  readonly isOverdue: boolean;
  readonly holdTraining: boolean;
  readonly trainingHeld: boolean;
  readonly state: SymptomReport['state'];
  readonly readAt: string | null;
  readonly review: { readonly at: string; readonly by: string; readonly outcome: string; readonly note: string } | null;
  readonly version: number;
}

interface Around {
  code: string;
  side: 'left' | 'right';
  held: boolean;
  site: string;
  zone: string;
  reviewer: string | null;
}

/** The verdict that the answers gave when they were sent; by level where they say no more. */
function verdictOf(report: SymptomReport): SafetyVerdict {
  const kept = keptAnswers.safeParse(report.answers);
  if (!kept.success) return safetyVerdict(report.level);
  const { armCheck, ...answers } = kept.data;
  const verdict = armCheck && isArmCheckWords(armCheck) ? judgeArmCheck(armCheckCode(armCheck)) : judgeSymptomReport(answers);
  return verdict?.level === report.level ? verdict : safetyVerdict(report.level);
}

/** @throws Refusal 'not-found' out of reach. */
export async function viewReport(work: Work, { id }: { id: string }): Promise<ReportView> {
  await work.em.flush();
  const report = await findReport(work, id);
  const [around] = await work.sql<Around>(
    `select p.code, p.affected_side as side, p.training_held as held, s.name as site, s.time_zone as zone,
       (select g.label from role_grant g where g.account_id = ? and g.site_ids @> array[p.site_id] order by g.starts_at desc limit 1) as reviewer
     from participant p join site s on s.id = p.site_id where p.id = ?`,
    [report.reviewedBy ?? null, report.participantId],
  );
  if (!around) throw new Error('The participant of a report exists.');
  const verdict = verdictOf(report);
  const kept = keptAnswers.safeParse(report.answers);
  return {
    id,
    participantId: report.participantId,
    participantCode: around.code,
    siteName: around.site,
    timeZone: around.zone,
    today: localDate(work.now, around.zone),
    affectedSide: around.side,
    level: report.level,
    urgency: verdict.urgency,
    siteText: verdict.siteText,
    toldParticipant: `${verdict.participantTitle}. ${verdict.participantText}`,
    measureWithin: verdict.measureWithin,
    adverseEvent: verdict.adverseEvent,
    said: reportWords(report.answers),
    signs: kept.success ? kept.data.signs.map((code) => reportedSigns.find((sign) => sign.code === code)?.text ?? code) : [],
    noticedOn: report.noticedOn,
    note: report.note ?? null,
    reportedAt: report.reportedAt.toISOString(),
    dueAt: report.dueAt?.toISOString() ?? null,
    isOverdue: report.state !== 'reviewed' && report.dueAt != null && report.dueAt < work.now,
    holdTraining: report.holdTraining,
    trainingHeld: around.held,
    state: report.state,
    readAt: report.readAt?.toISOString() ?? null,
    review:
      report.reviewedAt && report.outcome
        ? { at: report.reviewedAt.toISOString(), by: around.reviewer ?? 'the site', outcome: report.outcome, note: report.reviewNote ?? '' }
        : null,
    version: report.version,
  };
}
