import { methodOf } from '../registry';
import { requireLevel, type Estimate } from '../result';
import { findRoot } from '../special/find-root';
import { requireTable, type FourfoldTable } from './counts';
import { logTailAt, meanExcessAt, supportOf, type TableSupport } from './table-support';

export interface ConditionalOddsRatio extends Estimate {
  readonly midPLower: number | null;
  readonly midPUpper: number | null;
}

/**
 * Odds ratio by conditional maximum likelihood, with exact limits (Cornfield
 * 1956) in lower and upper and mid-P limits beside them. At an end of the
 * support the estimate and the limit on that side are exactly 0 or infinite;
 * margins that allow one table only say nothing, and the limits are null.
 * @throws RangeError where a cell is no count (a whole number from 0 up) or the level is not inside (0, 1)
 */
export function conditionalOddsRatio(table: FourfoldTable): ConditionalOddsRatio {
  const { a, b, c, d, level = 0.95 } = table;
  requireTable(table);
  requireLevel(level);
  const support = supportOf(table);
  const about = { level, method: methodOf('conditionalOddsRatio'), n: a + b + c + d, events: a + c, leftOut: [] };
  const last = support.logWeights.length - 1;
  if (last === 0) {
    const reason = 'The margins allow only the observed table.';
    return { estimate: null, lower: null, upper: null, midPLower: null, midPUpper: null, reason, ...about };
  }
  const goal = Math.log((1 - level) / 2);
  const atLeast = support.observed === 0;
  const atMost = support.observed === last;
  const limit = (upper: boolean, mid: boolean) =>
    Math.exp(crossing((tilt) => (upper ? -1 : 1) * (logTailAt(support, tilt, !upper, mid) - goal)));
  return {
    estimate: atLeast ? 0 : atMost ? Number.POSITIVE_INFINITY : Math.exp(likeliest(support)),
    lower: atLeast ? 0 : limit(false, false),
    upper: atMost ? Number.POSITIVE_INFINITY : limit(true, false),
    midPLower: atLeast ? 0 : limit(false, true),
    midPUpper: atMost ? Number.POSITIVE_INFINITY : limit(true, true),
    ...about,
  };
}

function likeliest(support: TableSupport): number {
  return crossing((tilt) => meanExcessAt(support, tilt));
}

/** Root of a rising function of the log odds ratio. */
function crossing(f: (tilt: number) => number): number {
  let from = 0;
  let to = 0;
  for (let width = 1; f(from) > 0; width *= 2) from -= width;
  for (let width = 1; f(to) < 0; width *= 2) to += width;
  return findRoot(f, from, to, 1e-15);
}
