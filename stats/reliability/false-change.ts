import { normal } from '../distributions';
import { requireRange } from '../result';

/** Readings behind a relative change of one limb against the other: two limbs at two times. */
const READINGS = 4;

/** How measurement error alone looks in a relative change, all in percent. */
export interface FalseChange {
  readonly sdOfChange: number;
  /** The change that error alone exceeds, either way, in 5 of 100. */
  readonly sdc95: number;
  /** Probability that one reading of the change is at or above the threshold. */
  readonly probability: number;
}

/**
 * Chance that a single visit crosses a threshold of relative change through
 * measurement error, to first order: the change carries `readings` independent
 * errors of the same size, so its SD is SEM sqrt(readings) (common practice;
 * first-order propagation of error).
 *
 * @param semPercent standard error of measurement of one limb's volume, percent.
 * @param trueChangePercent what the change really is; 0 for a false positive.
 * @param multiplier for the 95% figure; published figures often carry 1.96.
 * @throws RangeError for an SEM that is not above zero or fewer than one reading.
 * @see common practice, no source; propagation of error as in Bland & Altman, BMJ 1996;313:744
 */
export function falseChange({
  semPercent,
  thresholdPercent,
  trueChangePercent = 0,
  readings = READINGS,
  multiplier = normal.isf(0.025),
}: {
  semPercent: number;
  thresholdPercent: number;
  trueChangePercent?: number;
  readings?: number;
  multiplier?: number;
}): FalseChange {
  requireRange(semPercent > 0, `A standard error of measurement is above 0, not ${semPercent}.`);
  requireRange(readings >= 1, `A change rests on one reading or more, not ${readings}.`);
  const sdOfChange = semPercent * Math.sqrt(readings);
  return {
    sdOfChange,
    sdc95: multiplier * sdOfChange,
    probability: normal.sf((thresholdPercent - trueChangePercent) / sdOfChange),
  };
}

/**
 * The largest standard error of measurement, percent of one limb's volume, at
 * which a change of the threshold's size is beyond error at the level asked.
 *
 * @throws RangeError for a threshold that is not above zero.
 * @see de Vet et al., J Clin Epidemiol 2006;59:1033
 */
export function maxSemForThreshold(
  thresholdPercent: number,
  { multiplier = normal.isf(0.025), readings = READINGS }: { multiplier?: number; readings?: number } = {},
): number {
  requireRange(thresholdPercent > 0, `A threshold is above 0, not ${thresholdPercent}.`);
  return thresholdPercent / (multiplier * Math.sqrt(readings));
}
