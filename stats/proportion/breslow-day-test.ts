import { chiSquare } from '../distributions';
import { methodOf } from '../registry';
import type { Provenance } from '../result';
import type { TestStatistic } from './chi-square-test';
import { requireStrata, type Strata } from './strata';

export interface BreslowDayTest extends Provenance {
  readonly breslowDay: TestStatistic;
  /** With Tarone's term, which gives the chi-square distribution its due. */
  readonly tarone: TestStatistic;
  /** Informative strata less one. */
  readonly degreesOfFreedom: number;
  readonly reason?: string;
}

/**
 * Test that the odds ratio is the same in every stratum. Strata with an empty
 * margin say nothing about it and are left out, and said. Without two
 * informative strata, or where the common odds ratio is 0 or infinite, the
 * test does not exist.
 * @param strata columns of cells, one entry a stratum
 * @throws RangeError on columns of different length or cells that are no counts
 * @see Breslow & Day 1980, ch. 4. Tarone, Biometrika 1985;72:91
 */
export function breslowDayTest(strata: Strata): BreslowDayTest {
  requireStrata(strata);
  const { a: as, b: bs, c: cs, d: ds } = strata;
  let r = 0;
  let s = 0;
  let n = 0;
  let informative = 0;
  for (let i = 0; i < as.length; i++) {
    const [a, b, c, d] = [as[i] as number, bs[i] as number, cs[i] as number, ds[i] as number];
    if (!isInformative(a, b, c, d)) continue;
    informative++;
    n += a + b + c + d;
    r += (a * d) / (a + b + c + d);
    s += (b * c) / (a + b + c + d);
  }
  const leftOut = informative === as.length ? [] : [{ reason: 'Strata with an empty margin', count: as.length - informative }];
  const about = { degreesOfFreedom: informative - 1, method: methodOf('breslowDayTest'), n, leftOut };
  if (informative < 2 || r === 0 || s === 0) {
    const reason = informative < 2 ? 'Fewer than two strata can be compared.' : 'The common odds ratio is 0 or infinite.';
    return { breslowDay: { statistic: null, p: null }, tarone: { statistic: null, p: null }, reason, ...about };
  }
  let statistic = 0;
  let excess = 0;
  let variance = 0;
  for (let i = 0; i < as.length; i++) {
    const [a, b, c, d] = [as[i] as number, bs[i] as number, cs[i] as number, ds[i] as number];
    if (!isInformative(a, b, c, d)) continue;
    const fitted = fittedCell(r / s, a + b, c + d, a + c);
    const own = 1 / (1 / fitted + 1 / (a + c - fitted) + 1 / (a + b - fitted) + 1 / (d - a + fitted));
    statistic += (a - fitted) ** 2 / own;
    excess += a - fitted;
    variance += own;
  }
  const df = informative - 1;
  const tarone = Math.max(0, statistic - (excess * excess) / variance);
  return {
    breslowDay: { statistic, p: chiSquare.sf(statistic, df) },
    tarone: { statistic: tarone, p: chiSquare.sf(tarone, df) },
    ...about,
  };
}

function isInformative(a: number, b: number, c: number, d: number): boolean {
  return a + b > 0 && c + d > 0 && a + c > 0 && b + d > 0;
}

/** First cell that has the given odds ratio under the margins: the root written so that nothing cancels, also near a ratio of 1. */
function fittedCell(ratio: number, n1: number, n0: number, m1: number): number {
  const linear = n0 - m1 + ratio * (m1 + n1);
  const constant = ratio * m1 * n1;
  const root = Math.sqrt(Math.max(0, linear * linear + 4 * (1 - ratio) * constant));
  return linear >= 0 ? (2 * constant) / (linear + root) : (root - linear) / (2 * (1 - ratio));
}
