import { addDays, addWorkingDays, type LocalDate } from '@/instruments/calendar';
import { judgeArmCheck } from '@/instruments/safety/judge-arm-check';
import { judgeSymptomReport, type SafetyVerdict } from '@/instruments/safety/judge-symptom-report';
import type { ReportedSign, SymptomReportAnswers } from '@/instruments/safety/symptom-report';
import { armCheckCode, type ArmCheckWords } from '@/lib/training/arm-check-words';
import { dueAt } from '@/lib/safety/due-at';
import { localDate } from '@/lib/work/time';
import { minutesAfter } from './clock';
import type { Draw } from './draw';
import { eventBy, inserted, updated, type DemoEvent } from './events';
import type { Person } from './person';
import type { Plan } from './plan';

type Outcome = 'no action' | 'advice' | 'unscheduled visit' | 'adverse event';

/** One symptom report from the phone to the end of its review. */
export interface Report {
  readonly id: string;
  readonly clientKey: string;
  readonly at: Date;
  readonly on: LocalDate;
  readonly answers: SymptomReportAnswers & { readonly armCheck?: ArmCheckWords };
  readonly verdict: SafetyVerdict;
  readonly note: string | null;
  readonly readAt: Date | null;
  readonly review: { readonly at: Date; readonly outcome: Outcome; readonly note: string } | null;
  /** Training waits until this day; null where it never had to. */
  readonly heldUntil: LocalDate | null;
  readonly extraVisitOn: LocalDate | null;
}

interface Telling {
  readonly at: Date;
  readonly signs: readonly ReportedSign[];
  readonly lastedOverADay?: boolean | null;
  readonly soreness?: SymptomReportAnswers['soreness'];
  /** Said before training instead of in a report of its own. */
  readonly armCheck?: ArmCheckWords;
  readonly note?: string | null;
  readonly handling?: 'as usual' | 'unread' | 'read only';
  readonly extraVisitOn?: LocalDate;
}

const reviewWords: Record<Outcome, string> = {
  'no action': 'Soreness after training, gone by the next day.',
  advice: 'Called. The change had passed. Stay at the same load this week.',
  'unscheduled visit': 'Called. Both arms to be measured before training goes on.',
  'adverse event': 'Called at once. Seen by a doctor the same day; adverse event form filled in.',
};

function outcomeOf({ level }: SafetyVerdict): Outcome {
  if (level === 'S0') return 'no action';
  return level === 'S1' || level === 'S3' || level === 'S2' ? 'unscheduled visit' : 'adverse event';
}

export function makeReport(plan: Plan, person: Person, draw: Draw, ids: Draw, telling: Telling): Report {
  const { timeZone } = person.site;
  const answers = { signs: telling.signs, lastedOverADay: telling.lastedOverADay ?? null, soreness: telling.soreness ?? null, ...(telling.armCheck && { armCheck: telling.armCheck }) };
  const verdict = telling.armCheck ? judgeArmCheck(armCheckCode(telling.armCheck)) : judgeSymptomReport(answers);
  if (!verdict) throw new Error('A report tells of something.');
  const on = localDate(telling.at, timeZone);
  const due = dueAt(verdict.siteDeadline, telling.at, timeZone);
  const usual = telling.handling ?? 'as usual';
  const urgent = verdict.urgency === 'emergency now' || verdict.urgency === 'same-day care';
  const readAt = urgent ? minutesAfter(telling.at, draw.whole(9, 70)) : plan.clock.at(addWorkingDays(on, 1), draw.whole(530, 700), timeZone);
  // One in nine is reviewed past its time.
  const reviewedAt = due && draw.chance(0.11) ? minutesAfter(due, draw.whole(120, 2600)) : minutesAfter(readAt, draw.whole(6, urgent ? 120 : 260));
  const outcome = outcomeOf(verdict);
  const reviewed = usual === 'as usual' && plan.clock.isPast(reviewedAt);
  const seesOn = telling.extraVisitOn ?? addWorkingDays(localDate(reviewedAt, timeZone), draw.whole(1, 4));
  const measured = outcome === 'unscheduled visit' && reviewed;
  const open = verdict.holdTraining && !reviewed;
  return {
    id: ids.uuid(), clientKey: ids.uuid(), at: telling.at, on, answers, verdict, note: telling.note ?? null,
    readAt: usual !== 'unread' && plan.clock.isPast(readAt) ? readAt : null,
    review: reviewed ? { at: reviewedAt, outcome, note: reviewWords[outcome] } : null,
    extraVisitOn: measured ? seesOn : null,
    heldUntil: !verdict.holdTraining ? null : open ? '9999-12-31' : measured ? seesOn : addDays(on, 21),
  };
}

/** Reports that no arm check called for: soreness, and the rare grave ones. */
export function inventReports(plan: Plan, person: Person, ids: Draw, span: { from: LocalDate; to: LocalDate; days: number }): Report[] {
  const draw = person.draw('reports');
  const { timeZone } = person.site;
  const count = (perYear: number): number => Math.floor((span.days / 365) * perYear + draw.uniform(0, 1));
  const someDay = (): Date => plan.clock.at(addDays(span.from, draw.whole(0, Math.max(0, span.days - 1))), draw.whole(420, 1330), timeZone);
  const many = (perYear: number, tell: () => Omit<Telling, 'at'>): Report[] =>
    Array.from({ length: count(perYear) }, () => ({ at: someDay(), ...tell() })).filter(({ at }) => plan.clock.isPast(at)).map((telling) => makeReport(plan, person, draw, ids, telling));
  return [
    ...many(0.35, () => ({ signs: [], soreness: { days: draw.whole(1, 4), onlyTrainedMuscles: true } })),
    ...many(0.12, () => ({ signs: ['ache'], lastedOverADay: false, note: 'Passed by the evening.' })),
    ...many(0.1, () => ({ signs: draw.pick<ReportedSign[]>([['heavy'], ['full', 'tight'], ['tight-wear'], ['ache', 'heavy']]), lastedOverADay: true })),
    ...many(0.03, () => ({ signs: draw.pick<ReportedSign[]>([['hot', 'red'], ['red', 'tender', 'fever'], ['hot', 'tender']]) })),
    ...many(0.02, () => ({ signs: draw.pick<ReportedSign[]>([['numb-weak'], ['lump']]) })),
    ...scripted(plan, person, draw, ids),
  ];
}

function scripted(plan: Plan, person: Person, draw: Draw, ids: Draw): Report[] {
  const { cast, site } = person;
  const today = plan.clock.today(site.timeZone);
  const earlier = (minutes: number): Date => minutesAfter(plan.clock.now, -minutes);
  const made = (telling: Telling): Report => makeReport(plan, person, draw, ids, telling);
  const told = (cast?.reports ?? []).map(({ day, signs, extraVisitDay }) =>
    made({ at: plan.clock.at(addDays(person.enrolledOn, day), 1180, site.timeZone), signs, lastedOverADay: true, extraVisitOn: addDays(person.enrolledOn, extraVisitDay), note: 'Long drive at the weekend.' }));
  if (cast?.part === 'urgent report') return [...told, made({ at: earlier(168), signs: ['hot', 'red', 'fever'], note: 'Since last night.', handling: 'unread' })];
  if (cast?.part === 'report unread') return [...told, made({ at: plan.clock.at(addDays(today, -5), 1165, site.timeZone), signs: ['heavy'], lastedOverADay: true, handling: 'unread' })];
  if (cast?.part === 'report read') return [...told, made({ at: plan.clock.at(addDays(today, -2), 1240, site.timeZone), signs: ['full', 'tight-wear'], lastedOverADay: true, handling: 'read only' })];
  return told;
}

/** What the trail tells of a report. */
export function reportEvents(plan: Plan, person: Person, report: Report): DemoEvent[] {
  const { site } = person;
  const { verdict } = report;
  const due = dueAt(verdict.siteDeadline, report.at, site.timeZone);
  const row = {
    id: report.id, site_id: site.id, participant_id: person.id, reported_at: report.at.toISOString(), noticed_on: report.on, answers: { ...report.answers }, level: verdict.level,
    note: report.note, due_at: due?.toISOString() ?? null, hold_training: verdict.holdTraining, state: 'new', client_key: report.clientKey,
  };
  const hold = verdict.holdTraining ? [updated('participant', { id: person.id, training_held: true })] : [];
  const events = [eventBy(person.account, report.at, 'symptom.report', [inserted('symptom_report', row), ...hold])];
  if (report.readAt) events.push(eventBy(site.coordinator, report.readAt, 'symptom.read', [updated('symptom_report', { id: report.id, state: 'read', read_at: report.readAt.toISOString() })]));
  if (report.review) {
    const by = verdict.adverseEvent === 'none' ? site.coordinator : site.investigator;
    const { at, outcome, note } = report.review;
    const review = updated('symptom_report', {
      id: report.id, state: 'reviewed', outcome, review_note: note, reviewed_at: at.toISOString(), reviewed_by: by.accountId, read_at: (report.readAt ?? at).toISOString(),
    });
    events.push(eventBy(by, at, 'symptom.review', [review, ...(verdict.holdTraining ? [updated('participant', { id: person.id, training_held: false })] : [])]));
  }
  return events;
}
