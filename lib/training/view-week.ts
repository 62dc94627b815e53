import { addDays, daysBetween, mondayOf } from '@/instruments/calendar';
import { findQuestionnaire } from '@/instruments/questionnaires';
import { findOwnRecord } from '@/lib/people/find-own-record';
import { findProtocol } from '@/lib/protocol/find-protocol';
import { localDate, moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** One thing of a day of the week, for the seven-day staff. */
export type WeekItem =
  | { readonly kind: 'visit'; readonly name: string; readonly time: string | null; readonly done: boolean; readonly isWindow: boolean }
  | { readonly kind: 'session'; readonly number: number; readonly state: 'logged' | 'now' | 'planned'; readonly late: boolean }
  | { readonly kind: 'questionnaire'; readonly id: string; readonly title: string; readonly minutes: number; readonly closesOn: string; readonly begun: boolean }
  | { readonly kind: 'arm check' };

export interface WeekDay {
  readonly on: string;
  readonly isToday: boolean;
  readonly items: readonly WeekItem[];
}

/** A participant's week. */
export interface WeekView {
  /** Counted from the week of enrolment, which is week 1. */
  readonly weekNumber: number;
  readonly today: string;
  readonly site: { readonly name: string; readonly phone: string; readonly timeZone: string };
  readonly sessionsPerWeek: number;
  readonly sessionsLogged: number;
  readonly trainingHeld: boolean;
  /** By when the site answers the report that holds training; ISO, null when none waits. */
  readonly heldUntilAnswer: string | null;
  readonly isTraining: boolean;
  readonly baselineDone: boolean;
  readonly days: readonly WeekDay[];
}

interface Rows {
  readonly visits: readonly { name: string; opens_on: string; closes_on: string; booked_at: string | null; done_on: string | null; state: string }[];
  readonly sessions: readonly { on: string; late: boolean }[];
  readonly due: readonly { id: string; instrument: string; version: number; opens_on: string; due_on: string; closes_on: string; state: string }[];
}

async function loadRows(work: Work, participantId: string, from: string, to: string): Promise<Rows> {
  return {
    visits: await work.sql(
      `select name, opens_on::text, closes_on::text, booked_at::text, done_on::text, state from visit where participant_id = ?
         and (done_on between ? and ? or (state in ('to come', 'in progress') and (opens_on <= ? and closes_on >= ? or booked_at is not null))) order by target_on`,
      [participantId, from, to, to, from],
    ),
    sessions: await work.sql(`select local_on::text as "on", late from training_session where participant_id = ? and local_on between ? and ? order by local_on, entered_at`, [participantId, from, to]),
    due: await work.sql(
      `select id, instrument, instrument_version as version, opens_on::text, due_on::text, closes_on::text, state from questionnaire_response
       where participant_id = ? and state in ('due', 'in progress') and opens_on <= ? and closes_on >= ? order by due_on, instrument`,
      [participantId, to, from],
    ),
  };
}

const clamp = (day: string, from: string, to: string): string => (day < from ? from : day > to ? to : day);

/** Visits on their day: done, booked, or 'to be booked' on the first day of the week on which the window is open. */
function visitItems(visits: Rows['visits'], timeZone: string, span: { from: string; to: string; today: string }): [string, WeekItem][] {
  return visits.flatMap(({ name, opens_on, closes_on, booked_at, done_on, state }): [string, WeekItem][] => {
    if (done_on !== null) return done_on >= span.from && done_on <= span.to ? [[done_on, { kind: 'visit', name, time: null, done: state !== 'in progress', isWindow: false }]] : [];
    if (booked_at !== null) {
      const at = moment(booked_at);
      const on = localDate(at, timeZone);
      const time = new Intl.DateTimeFormat('en-GB', { timeZone, hour: '2-digit', minute: '2-digit', hourCycle: 'h23' }).format(at);
      return on >= span.from && on <= span.to ? [[on, { kind: 'visit', name, time, done: false, isWindow: false }]] : [];
    }
    // What is not booked stands where it can first be done, so that it is not taken for an appointment at the week's end.
    const on = opens_on > span.today ? opens_on : span.today;
    return on <= span.to && closes_on >= span.today ? [[on, { kind: 'visit', name, time: null, done: false, isWindow: true }]] : [];
  });
}

/** Logged sessions on their day, the next one today, the rest with two days of rest between. */
function sessionItems(sessions: Rows['sessions'], perWeek: number, span: { to: string; today: string }): [string, WeekItem][] {
  const logged = sessions.map(({ on, late }, index): [string, WeekItem] => [on, { kind: 'session', number: index + 1, state: 'logged', late }]);
  const isDoneToday = sessions.some(({ on }) => on === span.today);
  const planned: [string, WeekItem][] = [];
  let day = isDoneToday ? addDays(span.today, 3) : span.today;
  for (let number = sessions.length + 1; number <= perWeek && day <= span.to; number += 1) {
    planned.push([day, { kind: 'session', number, state: day === span.today ? 'now' : 'planned', late: false }]);
    day = addDays(day, 3);
  }
  return [...logged, ...planned];
}

/** This week of the participant who is signed in, Monday to Sunday by the clock of the site. */
export async function viewWeek(work: Work): Promise<WeekView> {
  const { participant, site, today } = await findOwnRecord(work);
  const protocol = await findProtocol(work, participant.protocolVersionId);
  const from = mondayOf(today);
  const to = addDays(from, 6);
  const { visits, sessions, due } = await loadRows(work, participant.id, from, to);
  const [state] = await work.sql<{ due: string | null; baseline: boolean }>(
    `select (select min(due_at)::text from symptom_report where participant_id = ? and hold_training and state <> 'reviewed') as due,
       exists (select from limb_assessment a join visit v on v.id = a.visit_id where a.participant_id = ? and v.key = 'baseline' and a.state = 'complete') as baseline`,
    [participant.id, participant.id],
  );
  const isTraining = participant.state === 'enrolled' && (state?.baseline ?? false);
  const sessionsPerWeek = protocol.document.sessionsPerWeek;
  const items: [string, WeekItem][] = [
    ...visitItems(visits, site.timeZone, { from, to, today }),
    ...(isTraining && !participant.trainingHeld ? sessionItems(sessions, sessionsPerWeek, { to, today }) : sessionItems(sessions, 0, { to, today })),
    ...due.flatMap(({ id, instrument, version, due_on, closes_on, state: progress }): [string, WeekItem][] => {
      const found = findQuestionnaire(instrument, version);
      return found ? [[clamp(due_on, today, to), { kind: 'questionnaire', id, title: found.title, minutes: found.minutes, closesOn: closes_on, begun: progress === 'in progress' }]] : [];
    }),
    ...(participant.state === 'enrolled' ? ([[to, { kind: 'arm check' }]] as [string, WeekItem][]) : []),
  ];
  return {
    weekNumber: Math.floor(daysBetween({ from: mondayOf(participant.enrolledOn), to: from }) / 7) + 1,
    today,
    site,
    sessionsPerWeek,
    sessionsLogged: sessions.length,
    trainingHeld: participant.trainingHeld,
    heldUntilAnswer: state?.due ? moment(state.due).toISOString() : null,
    isTraining,
    baselineDone: state?.baseline ?? false,
    days: Array.from({ length: 7 }, (_, index) => {
      const on = addDays(from, index);
      return { on, isToday: on === today, items: items.filter(([day]) => day === on).map(([, item]) => item) };
    }),
  };
}
