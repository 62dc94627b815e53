import { criticalValue } from '../critical-value';
import { normal } from '../distributions';
import { methodOf } from '../registry';
import { requireRange } from '../result';

export interface PublishedInterval {
  readonly estimate: number;
  readonly lower: number;
  readonly upper: number;
  /** 'log' for ratios, 'linear' for differences and means. */
  readonly scale: 'log' | 'linear';
  readonly level?: number;
}

export interface PFromInterval {
  /** On the scale named. */
  readonly standardError: number;
  readonly z: number;
  readonly p: number;
  readonly method: string;
}

/**
 * The standard error and two-sided normal p that a published estimate and
 * interval imply (Altman & Bland 2011), as good as their rounding.
 * Ratios must be positive and limits in order, else RangeError.
 */
export function pFromInterval({ estimate, lower, upper, scale, level = 0.95 }: PublishedInterval): PFromInterval {
  requireRange(lower < upper, `The lower limit lies below the upper, not ${lower} and ${upper}.`);
  requireRange(Number.isFinite(estimate + lower + upper), 'An estimate and its limits are finite numbers.');
  requireRange(scale === 'linear' || (lower > 0 && estimate > 0), 'A ratio and its limits are positive.');
  const at = scale === 'log' ? Math.log : (x: number) => x;
  const standardError = (at(upper) - at(lower)) / (2 * criticalValue(level));
  const z = at(estimate) / standardError;
  return { standardError, z, p: 2 * normal.sf(Math.abs(z)), method: methodOf('pFromInterval') };
}
