import { betaDist } from '../distributions';
import { methodOf } from '../registry';
import { requireLevel, type Estimate } from '../result';
import { NOBODY, requireEvents, type OneGroup } from './counts';

/**
 * One proportion with exact limits (Clopper & Pearson 1934): beta quantiles,
 * each asked for in its own tail. Exactly 0 or 1 at the ends. n = 0 gives nulls
 * with a reason; counts that are none throw RangeError.
 */
export function clopperPearson({ events, n, level = 0.95 }: OneGroup): Estimate {
  requireEvents(events, n);
  requireLevel(level);
  const about = { level, method: methodOf('clopperPearson'), n, events, leftOut: [] };
  if (n === 0) return { estimate: null, lower: null, upper: null, reason: NOBODY, ...about };
  const tail = (1 - level) / 2;
  return {
    estimate: events / n,
    lower: events === 0 ? 0 : betaDist.quantile(tail, events, n - events + 1),
    upper: events === n ? 1 : betaDist.isf(tail, events + 1, n - events),
    ...about,
  };
}
