import { clusteredProportion } from '@/stats/progression/clustered-proportion';
import { quantileBands } from '@/stats/progression/quantile-bands';
import { findExercise } from '@/instruments/training/exercises';
import { swellingDefinition, type SwellingCode } from '@/instruments/swelling';
import { currentProtocol } from '@/lib/protocol/find-protocol';
import { readParticipantFlow, type ParticipantFlow } from '@/lib/summary/participant-flow';
import { readRuleWeeks } from '@/lib/summary/rule-weeks';
import type { Confirmation } from '@/lib/summary/swelling-timelines';
import { readWeeklyLoads } from '@/lib/summary/weekly-loads';
import type { Work } from '@/lib/work/work';
import { viewIncidence, type IncidenceView } from './incidence';
import type { ViewResultsInput } from './input';

/** Quantile bands of one exercise's heaviest load by week since the first session. */
export interface LoadCourse {
  readonly exercise: string;
  readonly name: string;
  readonly weeks: readonly { readonly week: number; readonly p10: number; readonly p25: number; readonly p50: number; readonly p75: number; readonly p90: number; readonly people: number }[];
  readonly n: number;
  readonly method: string;
}

/** Share of training weeks in which the progression rules were kept. */
export interface AdherenceView {
  readonly share: number | null;
  readonly lower: number | null;
  readonly upper: number | null;
  readonly weeks: number;
  readonly kept: number;
  readonly people: number;
  readonly method: string;
}

/** What the Results page shows: computed at this moment from the rows in reach. */
export interface ResultsView {
  readonly asOf: string;
  readonly protocolNumber: string;
  readonly confirmation: Confirmation;
  readonly definitions: readonly { readonly code: SwellingCode; readonly name: string }[];
  readonly flow: ParticipantFlow;
  readonly incidence: readonly [IncidenceView, IncidenceView];
  readonly loads: readonly LoadCourse[];
  readonly adherence: AdherenceView;
  /** Counts from 1 up to this are not shown to roles that may not read rows; 0 shows all. */
  readonly suppressBelow: number;
}

/** Weeks are drawn while at least this many people trained in them: quantiles of fewer say little. Common practice, no source. */
const leastPeople = 5;
const probabilities = [0.1, 0.25, 0.5, 0.75, 0.9] as const;

async function viewLoads(work: Work, programme: readonly string[]): Promise<LoadCourse[]> {
  const loads = await readWeeklyLoads(work);
  return programme.flatMap((exercise) => {
    const columns = loads.get(exercise);
    if (!columns) return [];
    const { bands, method, n } = quantileBands(columns.loadKg, columns.week, probabilities);
    const weeks = bands
      .filter((band) => band.n >= leastPeople)
      .map(({ week, quantiles: [p10 = 0, p25 = 0, p50 = 0, p75 = 0, p90 = 0], n: people }) => ({ week: week + 1, p10, p25, p50, p75, p90, people }));
    return [{ exercise, name: findExercise(exercise)?.name ?? exercise, weeks, n, method }];
  });
}

async function viewAdherence(work: Work): Promise<AdherenceView> {
  const { kept, participant } = await readRuleWeeks(work);
  const { estimate, lower, upper, n, events, clusters, method } = clusteredProportion(kept, participant);
  const within = (limit: number | null) => (limit === null ? null : Math.min(1, Math.max(0, limit)));
  return { share: estimate, lower: within(lower), upper: within(upper), weeks: n, kept: events ?? 0, people: clusters, method };
}

/** Everything on the Results page. Who may not read rows does not see counts below five. */
export async function viewResults(work: Work, { first, second, confirmation }: ViewResultsInput): Promise<ResultsView> {
  const protocol = await currentProtocol(work);
  const { swelling, exercises } = protocol.document;
  const offered = [...new Set([swelling.primary, ...swelling.alternatives])];
  const left = first ?? swelling.primary;
  const right = second ?? offered.find((code) => code !== left) ?? left;
  return {
    asOf: work.now.toISOString(),
    protocolNumber: protocol.number,
    confirmation,
    definitions: [...new Set([...offered, left, right])].map((code) => ({ code, name: swellingDefinition(code).name })),
    flow: await readParticipantFlow(work),
    incidence: [await viewIncidence(work, left, confirmation), await viewIncidence(work, right, confirmation)],
    loads: await viewLoads(work, exercises),
    adherence: await viewAdherence(work),
    suppressBelow: work.actor.role === 'investigator' ? 5 : 0,
  };
}
