import { addDays, type LocalDate } from '@/instruments/calendar';
import { findQuestionnaire } from '@/instruments/questionnaires';
import { elementsOf, type Questionnaire } from '@/instruments/questionnaires/define-questionnaire';
import { LEFT_OUT, NOT_TRIED } from '@/instruments/questionnaires/items';
import { scoreQuestionnaire } from '@/instruments/questionnaires/score';
import { minutesAfter } from './clock';
import type { Course } from './course';
import type { Draw } from './draw';
import { type DemoEvent, eventBy, inserted, updated } from './events';
import type { Person } from './person';
import { system, type Plan } from './plan';
import type { Leaving, PlannedVisit } from './visit-plan';

export interface AnsweredAt {
  readonly id: string;
  readonly instrument: string;
  readonly submittedAt: Date | null;
}

/** How a person stands towards the questions, on a scale where 0 is no complaint. */
interface Leaning { readonly symptoms: number; readonly hindrance: number; readonly confidence: number; readonly worry: number }

const toChoice = (value: number): number => Math.min(3, Math.max(0, Math.round(value)));

function level(draw: Draw, leaning: Leaning, change: number, item: string): number {
  const swelling = Math.max(0, change) * 14;
  if (item === 'swelling') return Math.min(change > 0.09 ? 3 : 1, toChoice(draw.normal(leaning.symptoms - 0.4 + swelling, 0.5)));
  // Heat calls for care at once; the demonstration keeps it for the reports it tells.
  if (item === 'warmth') return 0;
  if (['heaviness', 'tightness', 'ache', 'numbness', 'stiffness', 'tiredness', 'bother'].includes(item)) return toChoice(draw.normal(leaning.symptoms + 0.6 * swelling, 0.6));
  if (['lift-home', 'train-alone', 'notice', 'next-step'].includes(item)) return toChoice(draw.normal(leaning.confidence, 0.6));
  if (item.startsWith('worry') || item === 'avoid') return toChoice(draw.normal(leaning.worry + 0.3 * swelling, 0.6));
  return toChoice(draw.normal(leaning.hindrance + 0.4 * swelling, 0.6));
}

/** Answers as the form would hand them in, and the items left out on purpose. */
function answer(draw: Draw, questionnaire: Questionnaire, leaning: Leaning, change: number): { answers: Record<string, number | string>; leftOut: string[] } {
  const answers: Record<string, number | string> = {};
  for (const { name, visibleIf } of elementsOf(questionnaire.survey)) {
    const hidden = visibleIf !== undefined && !Object.values(answers).some((value) => typeof value === 'number' && value > 0);
    const [left, untried] = [draw.chance(0.012), draw.chance(0.04)];
    const value = level(draw, leaning, change, name);
    if (hidden) continue;
    answers[name] = left ? LEFT_OUT : questionnaire.key === 'daily-tasks' && untried ? NOT_TRIED : value;
  }
  return { answers, leftOut: Object.keys(answers).filter((name) => answers[name] === LEFT_OUT) };
}

/** Every questionnaire of every visit, from opening to submit, miss or waiting. */
export function questionEvents(input: { plan: Plan; person: Person; visits: readonly PlannedVisit[]; course: Course; leaving: Leaving | null; enrolledAt: Date }): { events: DemoEvent[]; answered: AnsweredAt[] } {
  const { plan, person, course, leaving, enrolledAt } = input;
  const draw = person.draw('questions');
  const ids = draw;
  const leaning: Leaning = { symptoms: draw.between(-0.6, 2, 0.35, 0.5), hindrance: draw.between(-0.6, 2, 0.3, 0.5), confidence: draw.between(0.5, 3, 1.9, 0.6), worry: draw.between(-0.4, 2.6, 0.9, 0.6) };
  const answered: AnsweredAt[] = [];
  const events = input.visits.flatMap((visit) =>
    visit.questionnaires.flatMap((key) => {
      const questionnaire = findQuestionnaire(key);
      if (!questionnaire) throw new Error(`The protocol asks for ${key}, which no questionnaire answers to.`);
      const due = { id: ids.uuid(), visit, questionnaire };
      const stopped = leaving?.grade === 'no further data' && leaving.on < visit.closesOn;
      const done = respond({ plan, person, draw, due, leaning, course, stopped, joinedAt: minutesAfter(enrolledAt, 190) });
      answered.push({ id: due.id, instrument: key, submittedAt: done.submittedAt });
      return [eventBy(person.site.coordinator, enrolledAt, 'participant.enrol', [inserted('questionnaire_response', laidOut(person, due))]), ...done.events];
    }),
  );
  return { events, answered };
}

type Due = { id: string; visit: PlannedVisit; questionnaire: Questionnaire };

const laidOut = (person: Person, { id, visit, questionnaire }: Due) => ({
  id, site_id: person.site.id, participant_id: person.id, visit_id: visit.id, instrument: questionnaire.key, instrument_version: questionnaire.version,
  due_on: visit.targetOn, opens_on: visit.opensOn, closes_on: visit.closesOn, state: 'due',
});

function respond({ plan, person, draw, due, leaning, course, stopped, joinedAt }: {
  joinedAt: Date; plan: Plan; person: Person; draw: Draw; due: Due; leaning: Leaning; course: Course; stopped: boolean;
}): { events: DemoEvent[]; submittedAt: Date | null } {
  const { visit, questionnaire, id } = due;
  const { timeZone } = person.site;
  const on = answerDay(draw, visit);
  const change = course((Date.parse(on) - Date.parse(person.enrolledOn)) / 86_400_000);
  const { answers, leftOut } = answer(draw, questionnaire, leaning, change);
  const wished = plan.clock.at(on, draw.whole(430, 1310), timeZone);
  const startedAt = wished < joinedAt ? minutesAfter(joinedAt, 25) : wished;
  const submittedAt = minutesAfter(startedAt, questionnaire.minutes * draw.uniform(0.6, 1.8));
  const fate = draw.uniform(0, 1);
  const unfinished = draw.chance(0.03);
  if (stopped || fate > person.diligence + 0.08) return missed(plan, person, due);
  if (person.cast?.part === 'before month 3' && visit.key === 'month-3') return { events: [], submittedAt: null };
  if (!plan.clock.isPast(submittedAt)) return { events: [], submittedAt: null };
  if (unfinished && plan.clock.age(visit.closesOn, timeZone) <= 0) {
    const some = Object.fromEntries(Object.entries(answers).slice(0, 3));
    return { events: [eventBy(person.account, startedAt, 'questionnaire.save', [updated('questionnaire_response', { id, state: 'in progress', started_at: startedAt.toISOString(), answers: some, page: 3 })])], submittedAt: null };
  }
  const scores = Object.fromEntries(scoreQuestionnaire(questionnaire, answers).scores.map(({ code, value }) => [code, value]));
  const row = { id, state: 'submitted', started_at: startedAt.toISOString(), submitted_at: submittedAt.toISOString(), answers, left_out: leftOut, page: elementsOf(questionnaire.survey).length, scores };
  return { events: [eventBy(person.account, submittedAt, 'questionnaire.submit', [updated('questionnaire_response', row)])], submittedAt };
}

function answerDay(draw: Draw, visit: PlannedVisit): LocalDate {
  const near = visit.outcome.kind === 'done' && visit.outcome.on <= visit.closesOn ? visit.outcome.on : visit.targetOn;
  const on = addDays(near, draw.pick([-3, -2, -1, -1, 0, 0, 0, 1, 2]));
  return on < visit.opensOn ? visit.opensOn : on > visit.closesOn ? visit.closesOn : on;
}

function missed(plan: Plan, person: Person, { visit, id }: Due): { events: DemoEvent[]; submittedAt: null } {
  const at = plan.clock.at(addDays(visit.closesOn, 1), 180, person.site.timeZone);
  const over = plan.clock.isPast(at);
  return { events: over ? [eventBy(system, at, 'job.mark-missed', [updated('questionnaire_response', { id, state: 'missed' })])] : [], submittedAt: null };
}
