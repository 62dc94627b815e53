import { checkLimbSitting, checkOpenTrials, type LimbSitting, type SittingFinding } from '@/instruments/checks/limb-sitting';
import { combineTrials } from '@/instruments/measurement/combine-trials';
import { parseGirthCm } from '@/instruments/measurement/parse';
import type { OpenAssessmentView } from '@/lib/measurement/view-open';
import { formatNumber } from '../ui/format';
import { cellName, type GridCell } from './grid-keys';

/** What stands in the cells, as typed. */
export type Typed = Readonly<Record<string, string>>;

/** A typed girth read: millimetres, or what is wrong with it. Empty is neither. */
export interface ReadCell {
  readonly mm: number | null;
  readonly problem: string | null;
}

/** The narrowest and widest the record takes, millimetres. */
const takesMm = [100, 700] as const;

export function readCell(text: string | undefined): ReadCell {
  if (!text?.trim()) return { mm: null, problem: null };
  const read = parseGirthCm(text);
  if (!read.ok) return { mm: null, problem: read.reason };
  if (read.value < takesMm[0] || read.value > takesMm[1])
    return { mm: null, problem: read.suspicion ?? `${formatNumber(read.value / 10, 1)} cm is no girth of an arm. Measure it again.` };
  return { mm: read.value, problem: null };
}

/** The cells as the server kept them. */
export const typedFrom = (trials: OpenAssessmentView['trials']): Typed =>
  Object.fromEntries(
    trials.flatMap(({ side, trial, circumferencesMm }) =>
      circumferencesMm.flatMap((mm, level) => (mm === null ? [] : [[cellName({ side, trial, level }), (mm / 10).toFixed(1)]])),
    ),
  );

/** One column in millimetres, unread levels null. */
export const columnMm = (typed: Typed, side: 'left' | 'right', trial: number, levelCount: number): (number | null)[] =>
  Array.from({ length: levelCount }, (_, level) => readCell(typed[cellName({ side, trial, level })]).mm);

/** The sitting as the edit checks take it. */
export function sittingOf(typed: Typed, { map, method, toleranceMm }: Pick<OpenAssessmentView, 'map' | 'method' | 'toleranceMm'>): LimbSitting {
  const arm = (side: 'left' | 'right') => ({
    first: columnMm(typed, side, 1, map.levelCount),
    second: columnMm(typed, side, 2, map.levelCount),
    third: columnMm(typed, side, 3, map.levelCount),
  });
  return {
    map: { startOffsetMm: map.startOffsetMm, stepMm: map.stepMm, levels: map.levelCount },
    method: method === 'disk' ? 'disk' : 'frustum',
    toleranceMm,
    left: arm('left'),
    right: arm('right'),
  };
}

/** Levels at which the two trials of an arm differ beyond the tolerance. */
export const thirdLevels = (sitting: LimbSitting, side: 'left' | 'right'): number[] =>
  sitting[side].first.flatMap((first, level) =>
    combineTrials({ first, second: sitting[side].second[level] ?? null }, sitting.toleranceMm).thirdNeeded ? [level] : [],
  );

const trialNumbers = { first: 1, second: 2, third: 3 } as const;

/** Something doubtful at a place on the grid. */
export interface Doubt {
  readonly check: string;
  readonly severity: SittingFinding['severity'];
  readonly message: string;
  /** As the server names it: 'left 2 5', 'left', 'whole', 'weight', 'ratio'. */
  readonly place: string;
  /** What was probably meant, as it would be typed. */
  readonly likely?: { readonly typed: string; readonly unit: string };
}

/** Names a place as the server does. */
const placeOf = ({ side, trial, level }: SittingFinding['at']): string => [side, trial && trialNumbers[trial], level].filter((part) => part !== undefined).join(' ') || 'whole';

/** While a value is being typed it is not yet doubtful, unless it is longer than any girth; it is spoken of once it is left. */
export const isHalfTyped = (place: string, typing: string | null, typed: Typed): boolean => place === typing && (typed[place] ?? '').length <= 3;

/** What this sitting makes doubtful: value, taper and trial against trial while it is open; the whole of it once every reading is in. */
export const doubtsOf = (sitting: LimbSitting, isWhole: boolean): Doubt[] =>
  (isWhole ? checkLimbSitting(sitting) : checkOpenTrials(sitting)).map(({ check, severity, message, at }) => ({ check, severity, message, place: placeOf(at) }));

/** The girth to draw at a level: the settled one, or the latest reading; trial 1 only while it may be seen. */
export function drawnMm(sitting: LimbSitting, side: 'left' | 'right', firstCovered: boolean): (number | null)[] {
  const { first, second, third } = sitting[side];
  return first.map((one, level) => {
    if (firstCovered) return second[level] ?? null;
    const { girthMm } = combineTrials({ first: one, second: second[level] ?? null, third: third[level] ?? null }, sitting.toleranceMm);
    return girthMm ?? second[level] ?? one;
  });
}

/** 'Right, 20 cm, trial 2' of a cell. */
export function placeWords(cell: GridCell, { startOffsetMm, stepMm }: { startOffsetMm: number; stepMm: number }): string {
  return `${cell.side === 'left' ? 'Left' : 'Right'}, ${formatNumber((startOffsetMm + cell.level * stepMm) / 10, 0)} cm, trial ${cell.trial}`;
}
