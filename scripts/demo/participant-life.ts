import { addDays, daysBetween, type LocalDate } from '@/instruments/calendar';
import { judgeSessions, type TrainingFlag } from '@/instruments/training/judge-sessions';
import type { FlagDetail } from '@/lib/training/judge-record';
import { toTrainingSession } from '@/lib/training/training-record';
import { inventArms } from './arm';
import { minutesAfter } from './clock';
import { inventCourse } from './course';
import { type Change, type DemoEvent, eventBy, inserted, type Row, updated } from './events';
import { doubtsAbout, queryEvents, storyDoubts, verificationEvents } from './margin';
import type { Person } from './person';
import { type Plan, system } from './plan';
import { questionEvents } from './questions';
import { inventReports, type Report, reportEvents } from './reports';
import { enrolledScreening } from './screenings';
import { measure, type Sitting, sittingEvents, underWayEvents } from './sitting';
import { type LoggedSession, liveTraining } from './training-life';
import { extraVisit, type Leaving, planLeaving, planVisits, type PlannedVisit } from './visit-plan';

/** What the tests look at without a data base. */
export interface Life {
  readonly person: Person;
  readonly sittings: readonly Sitting[];
  readonly sessions: readonly LoggedSession[];
  readonly flags: readonly TrainingFlag[];
  readonly visits: readonly PlannedVisit[];
  readonly reports: readonly Report[];
  readonly leaving: Leaving | null;
  readonly events: readonly DemoEvent[];
}

type DoneVisit = PlannedVisit & { readonly outcome: { readonly kind: 'done'; readonly on: LocalDate; readonly minutes: number } };
const isDone = (visit: PlannedVisit): visit is DoneVisit => visit.outcome.kind === 'done';

/** One participant from screening to today. */
export function live(plan: Plan, person: Person, screeningNumber: number): Life {
  const ids = person.draw('margin');
  const course = person.cast?.course ?? inventCourse(person.draw('course'), person.facts);
  const leaving = planLeaving(plan, person, person.draw('visits'));
  const scheduled = planVisits(plan, person, leaving, ids);
  const enrolledAt = enrolmentMoment(plan, person);
  const { sessions, reports } = train(plan, person, { course, scheduled, leaving, ids });
  const visits = [...scheduled, ...extraVisits(plan, person, scheduled, reports, ids)];
  const scene = { plan, person, arms: inventArms(person, course), ids, draw: person.draw('sitting') };
  const sittings = measureAll(scene, visits, sessions);
  const flags = judge(plan, sessions, sittings);
  const questions = questionEvents({ plan, person, visits: scheduled, course, leaving, enrolledAt });
  const laidOut = questions.events.filter(({ act }) => act === 'participant.enrol').flatMap(({ changes }) => changes);
  const enrolment = [inserted('participant', participantRow(plan, person)), inserted('visit', ...scheduled.map((visit) => visitRow(plan, person, visit))), ...laidOut];
  const current = scheduled.find(({ outcome }) => outcome.kind === 'under way');
  const margin = { plan, person, draw: scene.draw, ids };
  const doubts = person.cast?.course ? storyDoubts(sittings) : sittings.flatMap((sitting) => doubtsAbout(margin, sitting));
  const events = [
    ...enrolledScreening(plan, person, screeningNumber, enrolledAt, enrolment),
    ...joinEvents(plan, person, minutesAfter(enrolledAt, 190)),
    ...visits.flatMap((visit) => visitEvents(plan, person, visit, enrolledAt)),
    ...sittings.flatMap((sitting) => sittingEvents(scene, sitting)),
    ...(current && current.outcome.kind === 'under way' ? underWayEvents(scene, current, current.outcome.on) : []),
    ...questions.events.filter(({ act }) => act !== 'participant.enrol'),
    ...reports.flatMap((report) => reportEvents(plan, person, report)),
    ...sessions.flatMap((session) => sessionEvents(plan, person, session, flags.filter(({ sessionId }) => sessionId === session.id), ids)),
    ...doubts.flatMap((doubt) => queryEvents(margin, doubt)),
    ...verificationEvents(margin, scheduled, sittings),
    ...endEvents(plan, person, leaving, scheduled),
  ];
  return { person, sittings, sessions, flags, visits, reports, leaving, events };
}

function enrolmentMoment(plan: Plan, person: Person): Date {
  return plan.clock.at(person.enrolledOn, 528, person.site.timeZone);
}

function train(plan: Plan, person: Person, { course, scheduled, leaving, ids }: { course: ReturnType<typeof inventCourse>; scheduled: readonly PlannedVisit[]; leaving: Leaving | null; ids: ReturnType<Person['draw']> }) {
  const done = scheduled.filter(isDone);
  const baseline = done.find(({ key }) => key === 'baseline');
  const reports: Report[] = [];
  if (!baseline) return { sessions: [], reports };
  const today = plan.clock.today(person.site.timeZone);
  const finished = done.find(({ key }) => key === 'month-24')?.outcome.on;
  const until = [today, leaving?.on, finished, addDays(person.enrolledOn, 745)].filter((date) => date !== undefined).toSorted()[0] ?? today;
  const from = baseline.outcome.on;
  reports.push(...inventReports(plan, person, ids, { from, to: until, days: Math.max(0, daysBetween({ from, to: until })) }));
  const sessions = liveTraining({ plan, person, ids, course, assessedOn: done.map(({ outcome }) => outcome.on), reports, from, until });
  return { sessions, reports };
}

/** Visits that reports led to; none where a visit stands within three days anyway. */
function extraVisits(plan: Plan, person: Person, scheduled: readonly PlannedVisit[], reports: readonly Report[], ids: ReturnType<Person['draw']>): PlannedVisit[] {
  const done = scheduled.filter(isDone).map(({ outcome }) => outcome.on);
  return reports.flatMap(({ extraVisitOn }) => {
    if (extraVisitOn === null || done.some((on) => Math.abs(daysBetween({ from: on, to: extraVisitOn })) <= 3)) return [];
    done.push(extraVisitOn);
    const visit = extraVisit(ids, extraVisitOn, 690);
    return plan.clock.age(extraVisitOn, person.site.timeZone) > 0 ? [visit] : [{ ...visit, outcome: { kind: 'booked' as const, on: extraVisitOn, minutes: 690 } }];
  });
}

function measureAll(scene: Parameters<typeof measure>[0], visits: readonly PlannedVisit[], sessions: readonly LoggedSession[]): Sitting[] {
  const sittings: Sitting[] = [];
  for (const visit of visits.filter(isDone).toSorted((a, b) => a.outcome.on.localeCompare(b.outcome.on))) {
    const before = sessions.filter(({ on }) => on < visit.outcome.on).at(-1)?.on ?? null;
    sittings.push(measure(scene, visit, sittings[0]?.sitting ?? null, before));
  }
  return sittings;
}

function judge(plan: Plan, sessions: readonly LoggedSession[], sittings: readonly Sitting[]): TrainingFlag[] {
  const judged = sessions.map(({ sets, ...session }) => toTrainingSession({ ...session, sets: sets.map((set) => ({ ...set, side: 'both' })) }));
  return judgeSessions(judged, sittings.map(({ sitting }) => sitting.on), sittings[0]?.sitting.on ?? null, plan.protocol.training);
}

function participantRow(plan: Plan, { id, site, code, number, facts, enrolledOn }: Person): Row {
  return {
    id, site_id: site.id, code, number, cohort: facts.cohort, affected_side: facts.affectedSide, dominant_side: facts.dominantSide, age_years: facts.ageYears, height_mm: facts.heightMm,
    surgery_on: facts.surgeryOn, surgery: facts.surgery, axillary_procedure: facts.axillaryProcedure, nodes_removed: facts.nodesRemoved, radiotherapy: facts.radiotherapy,
    systemic_therapy: facts.systemicTherapy, enrolled_on: enrolledOn, anchor_on: enrolledOn, state: 'enrolled', training_held: false, protocol_version_id: plan.ids.protocol,
  };
}

const visitRow = (plan: Plan, person: Person, visit: PlannedVisit): Row => ({
  id: visit.id, site_id: person.site.id, participant_id: person.id, key: visit.key, name: visit.name, target_on: visit.targetOn, opens_on: visit.opensOn, closes_on: visit.closesOn,
  state: 'to come', unscheduled_reason: visit.unscheduledReason, protocol_version_id: plan.ids.protocol,
});

function joinEvents(plan: Plan, person: Person, at: Date): DemoEvent[] {
  const { account, site, cast, identity } = person;
  if (!plan.clock.isPast(at)) return [];
  const signIn = cast?.signIn ? [inserted('credential', { account_id: account.accountId, email: identity.email, password_hash: `demo:${cast.signIn.password}`, changed_at: at.toISOString() })] : [];
  const changes: Change[] = [
    inserted('account', { id: account.accountId, kind: 'participant', label: person.code, state: 'active', created_at: at.toISOString() }),
    ...signIn,
    inserted('role_grant', {
      id: person.draw('names').uuid(), account_id: account.accountId, study_id: plan.ids.study, role: 'participant', label: person.code, whole_study: false, site_ids: [site.id], of_participant_id: person.id, starts_at: at.toISOString(),
    }),
  ];
  return [eventBy(system, at, 'account.join', changes)];
}

function visitEvents(plan: Plan, person: Person, visit: PlannedVisit, enrolledAt: Date): DemoEvent[] {
  const { site } = person;
  const { outcome } = visit;
  const events: DemoEvent[] = [];
  const notBefore = (at: Date): Date => (at < enrolledAt ? minutesAfter(enrolledAt, 2) : at);
  const sooner = (at: Date): Date => (plan.clock.isPast(at) ? at : minutesAfter(plan.clock.now, -50));
  if (outcome.kind === 'open') return [];
  const bookedOn = addDays(outcome.on, visit.unscheduledReason ? -1 : -9);
  const bookingAt = notBefore(sooner(plan.clock.at(bookedOn, 610, site.timeZone)));
  if (visit.unscheduledReason) events.push(eventBy(site.coordinator, bookingAt, 'visit.add', [inserted('visit', visitRow(plan, person, visit))]));
  if (outcome.kind === 'missed') {
    const at = sooner(plan.clock.at(outcome.on, 930, site.timeZone));
    return [...events, eventBy(site.coordinator, notBefore(at), 'visit.miss', [updated('visit', { id: visit.id, state: 'missed', missed_reason: outcome.reason })])];
  }
  const minutes = outcome.kind === 'under way' ? 600 : outcome.minutes;
  return [...events, eventBy(site.coordinator, minutesAfter(bookingAt, 1), 'visit.book', [updated('visit', { id: visit.id, booked_at: plan.clock.at(outcome.on, minutes, site.timeZone).toISOString() })])];
}

function sessionEvents(plan: Plan, person: Person, session: LoggedSession, flags: readonly TrainingFlag[], ids: ReturnType<Person['draw']>): DemoEvent[] {
  const record = { site_id: person.site.id, participant_id: person.id };
  const at = session.enteredAt;
  const row: Row = {
    ...record, id: session.id, local_on: session.on, time_zone: person.site.timeZone, entered_at: at.toISOString(), late: session.late, arm_check: session.armCheck, soreness: session.soreness,
    effort: session.effort, note: session.note, client_key: session.clientKey,
  };
  const sets = session.sets.map((set, index): Row => ({
    ...record, id: ids.uuid(), session_id: session.id, sequence: index + 1, exercise: set.exercise, equipment: set.equipment, basis: set.basis, side: 'both', load_typed: set.typed, unit: set.unit,
    load_g: set.loadG, repetitions: set.repetitions, set_count: set.setCount, effort: set.effort, already_lifted: set.alreadyLifted,
  }));
  const raised = flags.map((flag): Row => ({
    ...record, id: ids.uuid(), session_id: session.id, flag_key: flag.id, rule: flag.rule, exercise: flag.key?.split('|')[0] ?? null, raised_at: at.toISOString(), state: 'raised',
    detail: { ...detailOf(flag) },
  }));
  const logged = eventBy(person.account, at, 'training.log', [inserted('training_session', row), ...(sets.length > 0 ? [inserted('training_set', ...sets)] : []), ...(raised.length > 0 ? [inserted('training_flag', ...raised)] : [])]);
  const seenAt = plan.clock.at(addDays(session.on, 6), 640, person.site.timeZone);
  if (raised.length === 0 || !plan.clock.isPast(seenAt)) return [logged];
  return [logged, eventBy(person.site.coordinator, seenAt, 'flag.see', [updated('training_flag', ...raised.map(({ id }) => ({ id: id ?? null, state: 'seen' })))])];
}

const detailOf = ({ severity, on, key, facts }: TrainingFlag): FlagDetail => ({
  severity, on, key, load: facts?.load ?? null, previousLoad: facts?.previous?.load ?? null, lastWeekLoad: facts?.lastWeekMax ?? null, gapDays: facts?.gapDays ?? null,
});

function endEvents(plan: Plan, person: Person, leaving: Leaving | null, scheduled: readonly PlannedVisit[]): DemoEvent[] {
  if (leaving) {
    const at = plan.clock.at(leaving.on, 900, person.site.timeZone);
    return [eventBy(person.site.coordinator, at, 'participant.withdraw', [updated('participant', { id: person.id, state: 'withdrawn', left_on: leaving.on, left_grade: leaving.grade, left_reason: leaving.reason, training_held: false })])];
  }
  const last = scheduled.filter(isDone).find(({ key }) => key === 'month-24');
  if (!last) return [];
  return [eventBy(person.site.coordinator, plan.clock.at(last.outcome.on, 1015, person.site.timeZone), 'participant.correct', [updated('participant', { id: person.id, state: 'completed', left_on: last.outcome.on })])];
}
