import { trainingRule } from '@/instruments/training';
import { findExercise } from '@/instruments/training/exercises';
import type { Population } from '@/lib/summary/population';
import { readRuleWeeks } from '@/lib/summary/rule-weeks';
import { readWeeklyLoads } from '@/lib/summary/weekly-loads';
import type { Work } from '@/lib/work/work';
import { clusteredProportion } from '@/stats/progression/clustered-proportion';
import { quantileBands } from '@/stats/progression/quantile-bands';
import { showCount, type ShownCount } from './hide-small';

/** Quantile bands of one exercise's heaviest load by week since the first session. */
export interface LoadCourse {
  readonly exercise: string;
  readonly name: string;
  readonly equipment: string;
  readonly basis: string;
  readonly weeks: readonly { readonly week: number; readonly p10: number; readonly p25: number; readonly p50: number; readonly p75: number; readonly p90: number; readonly people: number }[];
  /** Weekly loads in the bands. */
  readonly n: number;
  /** Weekly loads of the exercise with other equipment, which do not compare. */
  readonly otherEquipment: number;
  readonly method: string;
}

/** A share of training weeks with limits that know that weeks of one person go together. */
export interface ShareOfWeeks {
  readonly share: number | null;
  readonly lower: number | null;
  readonly upper: number | null;
  readonly count: ShownCount;
}

/** Share of training weeks in which the progression rules were kept, and in which each was broken. */
export interface AdherenceView {
  readonly kept: ShareOfWeeks;
  readonly broken: readonly (ShareOfWeeks & { readonly rule: string; readonly title: string })[];
  readonly weeks: ShownCount;
  readonly people: ShownCount;
  readonly method: string;
}

/** Weeks are drawn while at least this many people trained in them: quantiles of fewer say little. Common practice, no source. */
const leastPeople = 5;
const probabilities = [0.1, 0.25, 0.5, 0.75, 0.9] as const;

/** One course an exercise of the programme, with the kind of equipment it is logged with most. */
export async function viewLoads(work: Work, programme: readonly string[], population: Population): Promise<LoadCourse[]> {
  const courses = await readWeeklyLoads(work, population);
  return programme.flatMap((exercise) => {
    const [most, ...others] = courses.filter((course) => course.exercise === exercise);
    if (!most) return [];
    const { bands, method, n } = quantileBands(most.loadKg, most.week, probabilities);
    const weeks = bands
      .filter((band) => band.n >= leastPeople)
      .map(({ week, quantiles: [p10 = 0, p25 = 0, p50 = 0, p75 = 0, p90 = 0], n: people }) => ({ week: week + 1, p10, p25, p50, p75, p90, people }));
    const otherEquipment = others.reduce((sum, { loadKg }) => sum + loadKg.length, 0);
    return [{ exercise, name: findExercise(exercise)?.name ?? exercise, equipment: most.equipment, basis: most.basis, weeks, n, otherEquipment, method }];
  });
}

/** A share whose count is hidden is hidden with it. Limits outside 0 and 1 are shown as 0 and 1. */
function shareOf(yes: Uint8Array, people: Float64Array, below: number): ShareOfWeeks {
  const { estimate, lower, upper, events = 0 } = clusteredProportion(yes, people);
  const count = showCount(events, below);
  if (count === null) return { share: null, lower: null, upper: null, count };
  const within = (limit: number | null) => (limit === null ? null : Math.min(1, Math.max(0, limit)));
  return { share: estimate, lower: within(lower), upper: within(upper), count };
}

export async function viewAdherence(work: Work, population: Population, below: number): Promise<AdherenceView> {
  const { kept, participant, broken } = await readRuleWeeks(work, population);
  const { n, clusters, method } = clusteredProportion(kept, participant);
  const notKept = kept.reduce((sum, one) => sum + 1 - one, 0);
  const all = shareOf(kept, participant, below);
  return {
    // The weeks not kept are the rest: a small rest is hidden by hiding the share.
    kept: showCount(notKept, below) === null ? { share: null, lower: null, upper: null, count: null } : all,
    broken: [...broken].map(([rule, weeks]) => ({ rule, title: trainingRule(rule).title, ...shareOf(weeks, participant, below) })),
    weeks: showCount(n, below),
    people: showCount(clusters, below),
    method,
  };
}
