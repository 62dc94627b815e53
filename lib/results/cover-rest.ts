import type { WeeklyLoads } from '@/lib/summary/weekly-loads';
import type { FlowStageView } from './flow';
import { hiddenAmong, type ShownCount } from './hide-small';
import type { IncidenceView } from './incidence';
import type { AdherenceView, LoadCourse } from './training-views';

/** What is shown of one choice of people. */
export interface ShownParts {
  readonly flow: readonly FlowStageView[];
  readonly left: readonly { readonly reason: string; readonly count: ShownCount }[];
  readonly incidence: readonly [IncidenceView, IncidenceView];
  readonly loads: readonly LoadCourse[];
  readonly adherence: AdherenceView;
}

/** Plain counts by name, of one part of the people. */
export type Counts = ReadonlyMap<string, number>;

type Reasons = readonly { readonly reason: string; readonly count: ShownCount }[];
const together = 'all reasons together';

const reasonCounts = (name: string, reasons: Reasons): [string, number][] => reasons.map(({ reason, count }) => [`${name}.${reason}`, count ?? 0]);

/** Every count of parts in which nothing is hidden, by the name under which `coverRest` asks for it. */
export function countsOf({ flow, left, incidence, adherence }: Omit<ShownParts, 'loads'>, loads: readonly WeeklyLoads[]): Counts {
  return new Map<string, number>([
    ...flow.flatMap(({ name, people, out }): [string, number][] => [[`flow.${name}`, people], ...reasonCounts(`flow.${name}`, out?.reasons ?? [])]),
    ...reasonCounts('left', left),
    ...incidence.flatMap(({ code, n, events, atRisk, at, leftOut }): [string, number][] => [
      [`${code}.n`, n ?? 0],
      [`${code}.events`, events ?? 0],
      ...atRisk.map((count, index): [string, number] => [`${code}.atRisk.${index}`, count ?? 0]),
      ...at.flatMap((read): [string, number][] => [[`${code}.events.${read.months}`, read.events ?? 0], [`${code}.atRisk.month-${read.months}`, read.atRisk ?? 0]]),
      ...reasonCounts(`${code}.leftOut`, leftOut),
    ]),
    ['weeks', adherence.weeks ?? 0],
    ['people', adherence.people ?? 0],
    ['kept', adherence.kept.count ?? 0],
    ...adherence.broken.map(({ rule, count }): [string, number] => [`broken.${rule}`, count ?? 0]),
    ...loads.flatMap(({ exercise, equipment, week }) => {
      const people = new Map<string, number>();
      for (const one of week) people.set(`load.${exercise}.${equipment}.${one + 1}`, (people.get(`load.${exercise}.${equipment}.${one + 1}`) ?? 0) + 1);
      return [...people];
    }),
  ]);
}

/** Would a count of the chosen part, shown beside the whole and the other parts, give a small one away? */
type Hides = (read: (counts: Counts) => number) => boolean;
interface Cover {
  readonly hides: Hides;
  /** Has the chosen part a count of this name? */
  knows(name: string): boolean;
}
const named = (name: string) => (counts: Counts): number => counts.get(name) ?? 0;

function coverFlow(flow: readonly FlowStageView[], cover: Cover): FlowStageView[] {
  const { hides } = cover;
  const kept: FlowStageView[] = [];
  for (const stage of flow) {
    const [here, before] = [named(`flow.${stage.name}`), kept.at(-1)];
    if (!hides(here) && !(before && hides((counts) => named(`flow.${before.name}`)(counts) - here(counts)))) kept.push(stage);
  }
  return kept.map(({ name, people, out }, index) => {
    const next = kept[index + 1];
    if (!next) return { name, people, out: null };
    const isWhole = flow[flow.findIndex((stage) => stage.name === name) + 1] === next;
    const reasons = out?.reasons ?? [];
    if (isWhole && !hidesAny(`flow.${name}`, reasons, cover)) return { name, people, out };
    return { name, people, out: people === next.people ? null : { reasons: [{ reason: together, count: people - next.people }] } };
  });
}

/** A reason that was put together with others has no count of its own: then all are put together. */
const hidesAny = (name: string, reasons: Reasons, { hides, knows }: Cover): boolean => reasons.some(({ reason }) => !knows(`${name}.${reason}`) || hides(named(`${name}.${reason}`)));

function coverReasons(name: string, reasons: Reasons, cover: Cover): Reasons {
  if (!hidesAny(name, reasons, cover)) return reasons;
  const sum = (counts: Counts) => [...counts].reduce((total, [key, count]) => total + (key.startsWith(`${name}.`) ? count : 0), 0);
  const shown = reasons.reduce<ShownCount>((total, { count }) => (total === null || count === null ? null : total + count), 0);
  return [{ reason: together, count: cover.hides(sum) ? null : shown }];
}

function coverIncidence(view: IncidenceView, cover: Cover): IncidenceView {
  const { code } = view;
  const shown = (name: string, count: ShownCount): ShownCount => (cover.hides(named(`${code}.${name}`)) ? null : count);
  const at = view.at.map((read) => {
    const counts = { events: shown(`events.${read.months}`, read.events), atRisk: shown(`atRisk.month-${read.months}`, read.atRisk) };
    return counts.events === null ? { ...read, ...counts, share: null, lower: null, upper: null, reason: read.reason ?? 'not shown' } : { ...read, ...counts };
  });
  const events = shown('events', view.events);
  const isTold = events !== null && at.every((read, index) => read.events !== null || view.at[index]?.events === null);
  return {
    ...view,
    n: shown('n', view.n),
    events,
    at: isTold ? at : at.map((read) => ({ ...read, share: null, lower: null, upper: null, reason: read.reason ?? 'not shown' })),
    // The curve is the events over time: where one of their counts is covered it would tell it.
    steps: isTold ? view.steps : [],
    atRisk: view.atRisk.map((count, index) => shown(`atRisk.${index}`, count)),
    leftOut: coverReasons(`${code}.leftOut`, view.leftOut, cover),
  };
}

const noShare = { share: null, lower: null, upper: null, count: null };

function coverAdherence(view: AdherenceView, hides: Hides): AdherenceView {
  const notKept = (counts: Counts) => named('weeks')(counts) - named('kept')(counts);
  return {
    ...view,
    weeks: hides(named('weeks')) ? null : view.weeks,
    people: hides(named('people')) ? null : view.people,
    kept: hides(named('kept')) || hides(notKept) ? noShare : view.kept,
    broken: view.broken.map((one) => (hides(named(`broken.${one.rule}`)) ? { ...one, ...noShare } : one)),
  };
}

/**
 * Complementary suppression: what is shown of one part (a site, or a cohort) stands beside the whole and beside every other
 * part, so a count is covered as well where a small one of another part could be had by subtraction. `parts` are all parts,
 * together the whole; `chosen` is the place of the one shown.
 */
export function coverRest<View extends ShownParts>(view: View, { parts, chosen, below }: { parts: readonly Counts[]; chosen: number; below: number }): View {
  const hides: Hides = (read) => hiddenAmong(parts.map(read), below).has(chosen);
  const cover: Cover = { hides, knows: (name) => parts[chosen]?.has(name) ?? false };
  return {
    ...view,
    flow: coverFlow(view.flow, cover),
    left: coverReasons('left', view.left, cover),
    incidence: [coverIncidence(view.incidence[0], cover), coverIncidence(view.incidence[1], cover)],
    loads: view.loads.map((load) => ({ ...load, otherEquipment: 0, weeks: load.weeks.filter(({ week }) => !hides(named(`load.${load.exercise}.${load.equipment}.${week}`))) })),
    adherence: coverAdherence(view.adherence, hides),
  };
}
