import { requireRange } from '../result';

/**
 * Standard error of measurement from a published reliability, SD sqrt(1 - ICC),
 * in the unit of the SD. It holds only in a population as spread as the one the
 * ICC came from. Streiner & Norman 2008, Health Measurement Scales.
 *
 * @throws RangeError for a negative SD or an ICC above 1.
 */
export function semFromIcc(sd: number, icc: number): number {
  requireRange(sd >= 0 && sd < Infinity, `A standard deviation is at or above 0, not ${sd}.`);
  requireRange(icc <= 1 && icc > -Infinity, `A reliability is at most 1, not ${icc}.`);
  return sd * Math.sqrt(1 - icc);
}
