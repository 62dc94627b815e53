import { mondayOf } from '@/instruments/calendar';
import { findExercise } from '@/instruments/training/exercises';
import { massToKg } from '@/instruments/units';
import { findOwnRecord } from '@/lib/people/find-own-record';
import type { Work } from '@/lib/work/work';
import { loadTrainingRecord, type KeptSession, type KeptSet } from './training-record';

/** An exercise by week: the heaviest load of each, in kilograms. */
export interface LiftedExercise {
  readonly code: string;
  readonly name: string;
  readonly weeks: readonly { readonly monday: string; readonly heaviestKg: number }[];
}

/** What a participant has logged, plainly: no praise, no streak. */
export interface LiftingView {
  readonly today: string;
  readonly sessionCount: number;
  readonly exercises: readonly LiftedExercise[];
  /** The newest first. */
  readonly sessions: readonly (Omit<KeptSession, 'sets'> & { readonly sets: readonly (KeptSet & { readonly name: string })[] })[];
}

const shownSessions = 12;
const shownWeeks = 26;

function byWeek(sessions: readonly KeptSession[]): LiftedExercise[] {
  const weeks = new Map<string, Map<string, number>>();
  for (const { on, sets } of sessions)
    for (const { exercise, equipment, typed, unit } of sets) {
      if (equipment === 'band' || equipment === 'body weight') continue;
      const own = weeks.get(exercise) ?? new Map<string, number>();
      const monday = mondayOf(on);
      own.set(monday, Math.max(own.get(monday) ?? 0, massToKg(typed, unit)));
      weeks.set(exercise, own);
    }
  return [...weeks].map(([code, own]) => ({
    code,
    name: findExercise(code)?.name ?? code,
    weeks: [...own].map(([monday, heaviestKg]) => ({ monday, heaviestKg })).slice(-shownWeeks),
  }));
}

export async function viewLifting(work: Work): Promise<LiftingView> {
  const { participant, site, today } = await findOwnRecord(work);
  const { sessions } = await loadTrainingRecord(work, { id: participant.id, protocolVersionId: participant.protocolVersionId, timeZone: site.timeZone });
  return {
    today,
    sessionCount: sessions.length,
    exercises: byWeek(sessions),
    sessions: sessions
      .slice(-shownSessions)
      .toReversed()
      .map((session) => ({ ...session, sets: session.sets.map((set) => ({ ...set, name: findExercise(set.exercise)?.name ?? set.exercise })) })),
  };
}
