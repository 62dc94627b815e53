import type { CoxDesign } from './cox-design';
import { CoxSweep, type Ties } from './cox-sweep';
import type { Codes } from './strata';
import { lastNotAfter } from './times';

/**
 * Score residuals of the rows, summed within clusters, on the scaled covariates.
 *
 * A row's residual is its event term less w (x dH - dG) over the event times at
 * which it is at risk, H being the baseline hazard and G the same with the
 * risk-set mean of x. Running sums of H and G give that in O(1) a row, so the
 * whole is O(n log n) whatever the ties. Those with the event at a tied time
 * are in Efron's steps with shares 1 - k/d only, hence the correction.
 * @see Lin & Wei, JASA 1989;84:1074. Therneau & Grambsch 2000, section 7.1
 * @returns clusters x p, row-major
 */
export function clusterScores(design: CoxDesign, ties: Ties, beta: Float64Array, cluster: Codes | undefined): Float64Array {
  const { p } = design;
  const sweep = new CoxSweep(design, ties);
  const hazards = runningHazards(sweep, beta);
  const { weight } = sweep.predictors;
  const codes = denseClusters(design, cluster);
  const out = new Float64Array(codes.count * p);
  for (let s = 0; s + 1 < design.stratumStarts.length; s++) {
    const [from, to] = [design.stratumStarts[s]!, design.stratumStarts[s + 1]!];
    for (let g = from; g < to; g++) {
      for (let i = design.starts[g]!; i < design.starts[g + 1]!; i++) {
        const before = design.entry === undefined ? -1 : from + lastNotAfter(design.time.subarray(from, to), design.entry[i]!);
        addResidual(out, codes.of[i]! * p, design, hazards, i, g, before < from ? -1 : before, weight[i]!);
      }
    }
  }
  return out;
}

interface Hazards {
  /** Running H and G (p a group) after each distinct time of its stratum. */
  readonly h: Float64Array;
  readonly g: Float64Array;
  /** Mean of x over the steps at the time, and Efron's corrections for those with the event there. */
  readonly mean: Float64Array;
  readonly tieH: Float64Array;
  readonly tieG: Float64Array;
}

function runningHazards(sweep: CoxSweep, beta: Float64Array): Hazards {
  const { p, time, stratumStarts } = sweep.design;
  const groups = time.length;
  const out: Hazards = {
    h: new Float64Array(groups),
    g: new Float64Array(groups * p),
    mean: new Float64Array(groups * p),
    tieH: new Float64Array(groups),
    tieG: new Float64Array(groups * p),
  };
  sweep.run(beta, (group, { s1, d1, deaths }, { h, hf, h2, h2f, h2ff }) => {
    out.h[group] = h;
    out.tieH[group] = hf;
    for (let j = 0; j < p; j++) {
      const at = group * p + j;
      out.g[at] = s1[j]! * h2 - d1[j]! * h2f;
      out.tieG[at] = s1[j]! * h2f - d1[j]! * h2ff;
      out.mean[at] = (s1[j]! * h - d1[j]! * hf) / deaths;
    }
  });
  for (let s = 0; s + 1 < stratumStarts.length; s++) {
    for (let g = stratumStarts[s]! + 1; g < stratumStarts[s + 1]!; g++) {
      out.h[g]! += out.h[g - 1]!;
      for (let j = 0; j < p; j++) out.g[g * p + j]! += out.g[(g - 1) * p + j]!;
    }
  }
  return out;
}

function addResidual(out: Float64Array, to: number, design: CoxDesign, hazards: Hazards, i: number, g: number, before: number, w: number): void {
  const { p, x, event } = design;
  const dead = event[i] === 1;
  const hazard = hazards.h[g]! - (before < 0 ? 0 : hazards.h[before]!) - (dead ? hazards.tieH[g]! : 0);
  for (let j = 0; j < p; j++) {
    const value = x[i * p + j]!;
    const at = g * p + j;
    const mean = hazards.g[at]! - (before < 0 ? 0 : hazards.g[before * p + j]!) - (dead ? hazards.tieG[at]! : 0);
    out[to + j]! += (dead ? value - hazards.mean[at]! : 0) - w * (value * hazard - mean);
  }
}

/** Clusters counted 0, 1, 2 … in order of appearance; each row its own when there is no such column. */
function denseClusters({ rows, n }: CoxDesign, cluster: Codes | undefined): { of: Uint32Array; count: number } {
  const of = new Uint32Array(n);
  if (cluster === undefined) {
    for (let i = 0; i < n; i++) of[i] = i;
    return { of, count: n };
  }
  const seen = new Map<number, number>();
  for (let i = 0; i < n; i++) {
    const code = cluster[rows[i]!]!;
    let dense = seen.get(code);
    if (dense === undefined) {
      dense = seen.size;
      seen.set(code, dense);
    }
    of[i] = dense;
  }
  return { of, count: seen.size };
}
