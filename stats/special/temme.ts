import { deviancePart } from './deviance-part';
import { erfc } from './erfc';

const ORDER = 26;

/**
 * Coefficients of eta / (lambda - 1) in powers of eta, where
 * eta^2 / 2 = lambda - 1 - log(lambda); they follow from the power series of
 * lambda - 1 (Temme 1979, section 3).
 */
const COEFFICIENTS = seriesOfEta(ORDER);

function seriesOfEta(order: number): Float64Array {
  const alpha = new Float64Array(order + 2);
  alpha[1] = 1;
  for (let k = 2; k <= order + 1; k++) {
    let sum = alpha[k - 1] as number;
    for (let j = 2; j < k; j++) sum -= j * (alpha[j] as number) * (alpha[k + 1 - j] as number);
    alpha[k] = sum / (k + 1);
  }
  const series = new Float64Array(order + 1);
  for (let m = 0; m <= order; m++) series[m] = (m + 1) * (alpha[m + 1] as number);
  series[1] = (series[1] as number) - 1;
  return series;
}

/**
 * Incomplete gamma ratio by the uniform expansion, for a > 20 and x within
 * 0.3 a of a, where both the series and the fraction crawl
 * (Temme NM. SIAM J Math Anal 1979;10:757-766; Gil, Segura, Temme. SIAM J Sci
 * Comput 2012;34:A2965-A2981, for the backward recurrence).
 */
export function temmeTail(a: number, x: number, upper: boolean): number {
  const exponent = deviancePart(a, x);
  const size = Math.sqrt(exponent);
  const eta = (x >= a ? size : -size) * Math.sqrt(2 / a);
  let after = 0;
  let here = 0;
  let slope = 0;
  let sum = 0;
  // here = beta_m, after = beta_(m+1), from beta_25 down to beta_0; the sum is Horner's.
  for (let m = ORDER - 1; m >= 0; m--) {
    const next = (COEFFICIENTS[m + 1] as number) + ((m + 2) * after) / a;
    after = here;
    here = next;
    sum = sum * eta + here;
    if (m === 1) slope = here;
  }
  const rest = ((Math.exp(-exponent) / Math.sqrt(2 * Math.PI * a)) * sum) / (1 + slope / a);
  const toward = x >= a === upper;
  const main = 0.5 * erfc(toward ? size : -size);
  return upper ? main + rest : main - rest;
}
