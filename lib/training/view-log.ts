import { mondayOf } from '@/instruments/calendar';
import type { Equipment, LoadBasis } from '@/instruments/training/exercises';
import { findExercise } from '@/instruments/training/exercises';
import type { TrainingSettings } from '@/instruments/training/settings';
import { findOwnRecord } from '@/lib/people/find-own-record';
import type { Work } from '@/lib/work/work';
import type { TrainingSession } from '@/instruments/training/session';
import { loadTrainingRecord, toTrainingSession, type KeptSession, type KeptSet } from './training-record';

/** An exercise of the programme as the phone asks for it. */
export interface LogExercise {
  readonly code: string;
  readonly name: string;
  readonly equipment: readonly Equipment[];
  readonly basis: LoadBasis;
}

/** An exercise as it was logged last. */
export interface LastTime extends KeptSet {
  readonly on: string;
}

const lastTimes = (sessions: readonly KeptSession[]): Record<string, LastTime> =>
  Object.fromEntries(sessions.flatMap(({ on, sets }) => sets.map((set) => [set.exercise, { ...set, on }])));

/** All that the phone needs to log a session and to say at once what the rules say. */
export interface LogView {
  readonly today: string;
  readonly enrolledOn: string;
  readonly site: { readonly name: string; readonly phone: string; readonly timeZone: string };
  readonly affectedSide: 'left' | 'right';
  readonly trainingHeld: boolean;
  readonly exercises: readonly LogExercise[];
  readonly settings: TrainingSettings;
  /** Every session so far, as the rules read it. */
  readonly recorded: readonly TrainingSession[];
  /** What was lifted last time, by exercise: a proposal, confirmed one by one. */
  readonly last: Readonly<Record<string, LastTime>>;
  readonly assessmentsOn: readonly string[];
  readonly baselineOn: string | null;
  /** 1 for the first of the week. */
  readonly sessionNumber: number;
}

/** The programme's exercises, in the order the protocol names them. */
export const programme = (codes: readonly string[]): LogExercise[] =>
  codes.flatMap((code) => {
    const found = findExercise(code);
    return found ? [{ code, name: found.name, equipment: found.equipment, basis: found.basis }] : [];
  });

/** What a participant sees before logging. */
export async function viewLog(work: Work): Promise<LogView> {
  const { participant, site, today } = await findOwnRecord(work);
  const record = await loadTrainingRecord(work, { id: participant.id, protocolVersionId: participant.protocolVersionId, timeZone: site.timeZone });
  const { sessions, assessmentsOn, baselineOn, settings, protocol } = record;
  return {
    today,
    enrolledOn: participant.enrolledOn,
    site,
    affectedSide: participant.affectedSide,
    trainingHeld: participant.trainingHeld,
    exercises: programme(protocol.document.exercises),
    settings,
    recorded: sessions.map(toTrainingSession),
    last: lastTimes(sessions),
    assessmentsOn,
    baselineOn,
    sessionNumber: sessions.filter(({ on }) => mondayOf(on) === mondayOf(today)).length + 1,
  };
}
