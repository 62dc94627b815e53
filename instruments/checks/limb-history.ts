import type { MethodIdentity } from '../measurement/comparable';
import { isSameMap } from '../measurement/map';
import type { Finding } from './define-edit-check';
import { atRiskChange, copiedForward, methodChanged, unaffectedChange, weightChange } from './since-last-visit';
import { armsSwapped } from './swap';

/** One saved assessment, by side, with what history checks need. */
export interface SavedAssessment {
  readonly identity: MethodIdentity;
  readonly leftMm: readonly (number | null)[];
  readonly rightMm: readonly (number | null)[];
  readonly leftMl: number | null;
  readonly rightMl: number | null;
  readonly weightKg: number | null;
}

/**
 * What earlier visits say about a sitting. To be run only after both trials are saved: an earlier value seen sooner
 * would guide the hand. `atRiskSide` names the arm; volumes are compared only where method and map agree.
 */
export function checkLimbHistory(input: { now: SavedAssessment; previous: SavedAssessment | null; baseline: SavedAssessment | null; atRiskSide: 'left' | 'right'; daysSincePrevious: number | null }): Finding[] {
  const { now, previous, baseline } = input;
  const found = [...(baseline ? baselineFindings(input, baseline) : []), ...(previous ? previousFindings(input, previous) : [])];
  return [baseline && methodChanged.run({ baseline: baseline.identity, visit: now.identity }), ...found].filter((finding) => finding !== null);
}

const HALF_A_YEAR_DAYS = 183;

function previousFindings({ now, atRiskSide, daysSincePrevious }: { now: SavedAssessment; atRiskSide: 'left' | 'right'; daysSincePrevious: number | null }, previous: SavedAssessment): (Finding | null)[] {
  const arms = sharedLevels(now, previous);
  const volumes = pair(volumeOf(previous, atRiskSide), volumeOf(now, atRiskSide));
  const weights = (daysSincePrevious ?? 0) <= HALF_A_YEAR_DAYS ? pair(previous.weightKg, now.weightKg) : null;
  return [
    arms.leftMm.length > 0 ? armsSwapped.run(arms) : null,
    arms.leftMm.length > 0 ? copiedForward.run({ previousMm: [...arms.previousLeftMm, ...arms.previousRightMm], nowMm: [...arms.leftMm, ...arms.rightMm] }) : null,
    isSameWay(now, previous) && volumes ? (atRiskChange.limit.run(volumes) ?? atRiskChange.range.run(volumes)) : null,
    weights ? (weightChange.limit.run(weights) ?? weightChange.range.run(weights)) : null,
  ];
}

function baselineFindings({ now, atRiskSide }: { now: SavedAssessment; atRiskSide: 'left' | 'right' }, baseline: SavedAssessment): (Finding | null)[] {
  const otherSide = atRiskSide === 'left' ? 'right' : 'left';
  const volumes = pair(volumeOf(baseline, otherSide), volumeOf(now, otherSide));
  return [isSameWay(now, baseline) && volumes ? (unaffectedChange.limit.run(volumes) ?? unaffectedChange.range.run(volumes)) : null];
}

function volumeOf(assessment: SavedAssessment, side: 'left' | 'right'): number | null {
  return side === 'left' ? assessment.leftMl : assessment.rightMl;
}

function pair(before: number | null, now: number | null): { before: number; now: number } | null {
  return before === null || now === null ? null : { before, now };
}

function isSameWay(a: SavedAssessment, b: SavedAssessment): boolean {
  return methodChanged.run({ baseline: b.identity, visit: a.identity }) === null;
}

/** The levels that both arms have both times; none when the marks were laid otherwise. */
function sharedLevels(now: SavedAssessment, previous: SavedAssessment) {
  const isMapKept = now.identity.map !== null && previous.identity.map !== null && isSameMap(now.identity.map, previous.identity.map);
  const rows = (isMapKept ? now.leftMm : []).flatMap((left, level) => {
    const row = { left, right: now.rightMm[level] ?? null, previousLeft: previous.leftMm[level] ?? null, previousRight: previous.rightMm[level] ?? null };
    const { right, previousLeft, previousRight } = row;
    return left === null || right === null || previousLeft === null || previousRight === null ? [] : [{ left, right, previousLeft, previousRight }];
  });
  return {
    leftMm: rows.map(({ left }) => left),
    rightMm: rows.map(({ right }) => right),
    previousLeftMm: rows.map(({ previousLeft }) => previousLeft),
    previousRightMm: rows.map(({ previousRight }) => previousRight),
  };
}
