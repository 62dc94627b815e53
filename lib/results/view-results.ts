import { swellingDefinition, type SwellingCode } from '@/instruments/swelling';
import { currentProtocol } from '@/lib/protocol/find-protocol';
import { readParticipantFlow } from '@/lib/summary/participant-flow';
import type { Population } from '@/lib/summary/population';
import type { Confirmation } from '@/lib/summary/swelling-timelines';
import { readWeeklyLoads } from '@/lib/summary/weekly-loads';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { countsOf, coverRest, type Counts, type ShownParts } from './cover-rest';
import { viewFlow } from './flow';
import { foldSmall } from './hide-small';
import { riskMonths, viewIncidence } from './incidence';
import { hidesSmall, isOffered, type ViewResultsInput } from './input';
import { viewAdherence, viewLoads } from './training-views';

/** What the Results page shows: computed at this moment from the rows in reach. */
export interface ResultsView extends ShownParts {
  readonly asOf: string;
  readonly protocolNumber: string;
  readonly confirmation: Confirmation;
  /** What the sentence may choose from. */
  readonly definitions: readonly { readonly code: SwellingCode; readonly name: string }[];
  readonly cohorts: readonly { readonly key: string; readonly name: string }[];
  readonly sites: readonly { readonly id: string; readonly name: string }[];
  readonly chosen: { readonly first: SwellingCode; readonly second: SwellingCode; readonly cohort: string | null; readonly siteId: string | null };
  readonly riskMonths: readonly number[];
  readonly firstLoadKg: readonly [number, number];
  /** Counts from 1 up to this, and what would give one by subtraction, are null for roles that may not read rows; 0 hides nothing. */
  readonly suppressBelow: number;
}

/** Traditional limit for shown tables (requirements base, DEI-17). */
const smallCount = 5;

/** How one choice of people is computed. */
interface Asked {
  readonly codes: readonly [SwellingCode, SwellingCode];
  readonly confirmation: Confirmation;
}

async function viewPart(work: Work, population: Population, { codes: [left, right], confirmation }: Asked, below: number): Promise<Omit<ShownParts, 'loads'>> {
  const flow = await readParticipantFlow(work, population);
  const incidence = (code: SwellingCode) => viewIncidence(work, code, { confirmation, population, below });
  return {
    flow: viewFlow(flow, below),
    left: foldSmall(flow.left.map(({ grade, count }) => ({ reason: grade, count })), below),
    incidence: [await incidence(left), await incidence(right)],
    adherence: await viewAdherence(work, population, below),
  };
}

/** Parts in one order, whichever is shown: equal counts are covered by place, in each view the same. */
const partName = ({ cohort, siteId }: Population): string => siteId ?? cohort ?? '';

/** What a part has less than the whole: people of no offered cohort. */
function restOf(whole: Counts, parts: readonly Counts[]): Counts {
  return new Map([...whole].map(([name, count]) => [name, count - parts.reduce((sum, part) => sum + (part.get(name) ?? 0), 0)]));
}

/** Plain counts of every part along the dimension chosen from, and of the people in none of them. */
async function readParts(work: Work, populations: readonly Population[], asked: Asked): Promise<Counts[]> {
  const read = async (population: Population) => countsOf(await viewPart(work, population, asked, 0), await readWeeklyLoads(work, population));
  const parts: Counts[] = [];
  for (const population of populations) parts.push(await read(population));
  return [...parts, restOf(await read({}), parts)];
}

/**
 * Everything on the Results page. Who may not read rows does not see counts below five, nor what would give one by subtraction.
 * @throws Refusal 'invalid' when such a role asks for one cohort at one site.
 */
export async function viewResults(work: Work, { first, second, confirmation, cohort, siteId }: ViewResultsInput): Promise<ResultsView> {
  const { number, document } = await currentProtocol(work);
  const offered = [...new Set([document.swelling.primary, ...document.swelling.alternatives])];
  const left = first ?? document.swelling.primary;
  const right = second ?? offered.find((code) => code !== left) ?? left;
  const population = { cohort, siteId };
  const below = hidesSmall(work.actor.role) ? smallCount : 0;
  if (!isOffered({ cohort, siteId }, work.actor.role)) throw new Refusal('invalid', 'Choose a cohort or a site, not both: from one cohort at one site counts under five could be worked out.', 'cohort');
  const sites = await work.sql<{ id: string; name: string }>('select id, name from site where id = any (?::uuid[]) order by name', [`{${work.actor.reach.join(',')}}`]);
  const asked: Asked = { codes: [left, right], confirmation };
  const shown = { ...(await viewPart(work, population, asked, below)), loads: await viewLoads(work, document.exercises, population) };
  // What is asked for is a part of its own, offered or not (an earlier protocol may have had other cohorts).
  const others: Population[] = siteId ? sites.map(({ id }) => ({ siteId: id })) : document.cohorts.map(({ key }) => ({ cohort: key }));
  const options = [population, ...others.filter((option) => option.siteId !== siteId || option.cohort !== cohort)].toSorted((a, b) => (partName(a) < partName(b) ? -1 : 1));
  const isPart = below > 0 && (cohort !== undefined || siteId !== undefined);
  return {
    asOf: work.now.toISOString(),
    protocolNumber: number,
    confirmation,
    definitions: [...new Set([...offered, left, right])].map((code) => ({ code, name: swellingDefinition(code).name })),
    cohorts: document.cohorts,
    sites,
    chosen: { first: left, second: right, cohort: cohort ?? null, siteId: siteId ?? null },
    riskMonths,
    firstLoadKg: [document.training.startFromKg, document.training.startKg],
    suppressBelow: below,
    ...(isPart ? coverRest(shown, { parts: await readParts(work, options, asked), chosen: options.indexOf(population), below }) : shown),
  };
}
