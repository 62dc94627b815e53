import type { LimbPair } from './limb';

export interface GirthDifference {
  /** At-risk minus unaffected; the largest over the levels, with its sign. */
  readonly differenceMm: number;
  /** Index of the level, 0 at the wrist. */
  readonly level: number;
}

export interface InterLimbDifference {
  /** At-risk minus unaffected volume. */
  readonly differenceMl: number | null;
  /** The same as a share of the unaffected arm's volume, in percent. */
  readonly differencePct: number | null;
  readonly maxGirth: GirthDifference | null;
}

/**
 * Inter-limb difference at one assessment. Papers differ in the denominator; here it is the unaffected arm.
 * A missing volume gives null; levels missing on either arm are passed over for the girth.
 */
export function interLimbDifference({ atRisk, unaffected }: LimbPair): InterLimbDifference {
  const differenceMl = atRisk.volumeMl === null || unaffected.volumeMl === null ? null : atRisk.volumeMl - unaffected.volumeMl;
  const differencePct = differenceMl === null || !unaffected.volumeMl ? null : (100 * differenceMl) / unaffected.volumeMl;
  return { differenceMl, differencePct, maxGirth: largest(girthDifferencesMm({ atRisk, unaffected })) };
}

/** At-risk minus unaffected girth at each level; null where either is missing. */
export function girthDifferencesMm({ atRisk, unaffected }: LimbPair): (number | null)[] {
  const levels = Math.max(atRisk.girthsMm.length, unaffected.girthsMm.length);
  return Array.from({ length: levels }, (_, level) => {
    const at = atRisk.girthsMm[level] ?? null;
    const un = unaffected.girthsMm[level] ?? null;
    return at === null || un === null ? null : at - un;
  });
}

/** Growth of the girth difference since baseline, (A2−U2)−(A1−U1), largest over levels measured both times. */
export function changeOfDifference({ now, baseline }: { now: LimbPair; baseline: LimbPair }): GirthDifference | null {
  const before = girthDifferencesMm(baseline);
  return largest(girthDifferencesMm(now).map((difference, level) => {
    const earlier = before[level] ?? null;
    return difference === null || earlier === null ? null : difference - earlier;
  }));
}

function largest(differencesMm: readonly (number | null)[]): GirthDifference | null {
  return differencesMm.reduce<GirthDifference | null>((max, differenceMm, level) => {
    if (differenceMm === null || (max !== null && differenceMm <= max.differenceMm)) return max;
    return { differenceMm, level };
  }, null);
}
