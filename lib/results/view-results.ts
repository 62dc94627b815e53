import { swellingDefinition, type SwellingCode } from '@/instruments/swelling';
import { currentProtocol } from '@/lib/protocol/find-protocol';
import { readParticipantFlow } from '@/lib/summary/participant-flow';
import type { Confirmation } from '@/lib/summary/swelling-timelines';
import type { Work } from '@/lib/work/work';
import { viewFlow, type FlowStageView } from './flow';
import { foldSmall, type ShownCount } from './hide-small';
import { riskMonths, viewIncidence, type IncidenceView } from './incidence';
import type { ViewResultsInput } from './input';
import { viewAdherence, viewLoads, type AdherenceView, type LoadCourse } from './training-views';

/** What the Results page shows: computed at this moment from the rows in reach. */
export interface ResultsView {
  readonly asOf: string;
  readonly protocolNumber: string;
  readonly confirmation: Confirmation;
  /** What the sentence may choose from. */
  readonly definitions: readonly { readonly code: SwellingCode; readonly name: string }[];
  readonly cohorts: readonly { readonly key: string; readonly name: string }[];
  readonly sites: readonly { readonly id: string; readonly name: string }[];
  readonly chosen: { readonly first: SwellingCode; readonly second: SwellingCode; readonly cohort: string | null; readonly siteId: string | null };
  readonly flow: readonly FlowStageView[];
  readonly left: readonly { readonly reason: string; readonly count: ShownCount }[];
  readonly incidence: readonly [IncidenceView, IncidenceView];
  readonly riskMonths: readonly number[];
  readonly loads: readonly LoadCourse[];
  readonly firstLoadKg: readonly [number, number];
  readonly adherence: AdherenceView;
  /** Counts from 1 up to this are null for roles that may not read rows; 0 hides nothing. */
  readonly suppressBelow: number;
}

/** Traditional limit for shown tables (requirements base, DEI-17). */
const smallCount = 5;

/** Everything on the Results page. Who may not read rows does not see counts below five. */
export async function viewResults(work: Work, { first, second, confirmation, cohort, siteId }: ViewResultsInput): Promise<ResultsView> {
  const { number, document } = await currentProtocol(work);
  const offered = [...new Set([document.swelling.primary, ...document.swelling.alternatives])];
  const left = first ?? document.swelling.primary;
  const right = second ?? offered.find((code) => code !== left) ?? left;
  const population = { cohort, siteId };
  const below = work.actor.role === 'investigator' ? smallCount : 0;
  const sites = await work.sql<{ id: string; name: string }>('select id, name from site where id = any (?::uuid[]) order by name', [`{${work.actor.reach.join(',')}}`]);
  const flow = await readParticipantFlow(work, population);
  const incidence = (code: SwellingCode) => viewIncidence(work, code, { confirmation, population, below });
  return {
    asOf: work.now.toISOString(),
    protocolNumber: number,
    confirmation,
    definitions: [...new Set([...offered, left, right])].map((code) => ({ code, name: swellingDefinition(code).name })),
    cohorts: document.cohorts,
    sites,
    chosen: { first: left, second: right, cohort: cohort ?? null, siteId: siteId ?? null },
    flow: viewFlow(flow, below),
    left: foldSmall(flow.left.map(({ grade, count }) => ({ reason: grade, count })), below),
    incidence: [await incidence(left), await incidence(right)],
    riskMonths,
    loads: await viewLoads(work, document.exercises, population),
    firstLoadKg: [document.training.startFromKg, document.training.startKg],
    adherence: await viewAdherence(work, population, below),
    suppressBelow: below,
  };
}
