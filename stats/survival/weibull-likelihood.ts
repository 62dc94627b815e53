/**
 * Log-likelihood of log T = eta + sigma W (W minimum extreme value) for rows
 * seen exactly or between two ends, with its derivatives in eta and log sigma.
 */

/** Value and derivatives of one row; reused from row to row. */
export interface RowDerivatives {
  value: number;
  eta: number;
  logSigma: number;
  etaEta: number;
  etaLogSigma: number;
  logSigmaLogSigma: number;
}

export function newRowDerivatives(): RowDerivatives {
  return { value: 0, eta: 0, logSigma: 0, etaEta: 0, etaLogSigma: 0, logSigmaLogSigma: 0 };
}

/** Density of the time itself, not of its logarithm: hence the last term. */
export function exactRow(out: RowDerivatives, logTime: number, eta: number, sigma: number): void {
  const z = (logTime - eta) / sigma;
  const u = Math.exp(z);
  out.value = z - u - Math.log(sigma) - logTime;
  toParameters(out, sigma, 1 - u, z * (1 - u), -u, -u * z, -u * z * z);
  out.logSigma -= 1;
}

/**
 * (left, right] with left = 0 for 'by right' and right = Infinity for 'not by left'.
 * With hazards u = exp(z) at the ends and D their difference, the likelihood is
 * exp(-u left) (1 - exp(-D)). D comes from the ratio of the ends, and sums over
 * both ends are written in D, so that a narrow interval keeps its digits.
 */
export function intervalRow(out: RowDerivatives, left: number, right: number, eta: number, sigma: number): void {
  const zLeft = left > 0 ? (Math.log(left) - eta) / sigma : 0;
  const uLeft = left > 0 ? Math.exp(zLeft) : 0;
  if (right === Infinity) {
    out.value = -uLeft;
    toParameters(out, sigma, -uLeft, -uLeft * zLeft, -uLeft, -uLeft * zLeft, -uLeft * zLeft * zLeft);
    return;
  }
  const apart = left > 0 ? Math.log1p((right - left) / left) / sigma : 0; // zRight - zLeft
  const zRight = left > 0 ? zLeft + apart : (Math.log(right) - eta) / sigma;
  const D = left > 0 ? uLeft * Math.expm1(apart) : Math.exp(zRight);
  const q = 1 / Math.expm1(D); // hazard odds of staying clear across the interval
  const r = q * (1 + q);
  const dz = D * zRight + uLeft * apart; // change of u z over the interval
  const dzz = D * zRight * zRight + uLeft * apart * (zLeft + zRight); // change of u z²
  out.value = -uLeft + Math.log(-Math.expm1(-D));
  toParameters(
    out,
    sigma,
    q * D - uLeft,
    q * dz - uLeft * zLeft,
    q * D - uLeft - r * D * D,
    q * dz - uLeft * zLeft - r * D * dz,
    q * dzz - uLeft * zLeft * zLeft - r * dz * dz,
  );
}

/**
 * From sums over the ends (first derivatives by 1 and z, second by 1, z, z²) to
 * eta and log sigma: dz/d eta = -1/sigma, dz/d log sigma = -z.
 */
function toParameters(out: RowDerivatives, sigma: number, one: number, z: number, oneOne: number, oneZ: number, zz: number): void {
  out.eta = -one / sigma;
  out.logSigma = -z;
  out.etaEta = oneOne / (sigma * sigma);
  out.etaLogSigma = (oneZ + one) / sigma;
  out.logSigmaLogSigma = zz + z;
}
