import { criticalValue } from '../critical-value';
import { methodOf } from '../registry';
import { requireTable, type FourfoldTable } from './counts';
import { ratioOf, type RatioEstimate } from './katz-risk-ratio';

/**
 * ad / bc with Woolf log limits (1955). A zero cell leaves the limits null
 * with a reason; no half is added. `conditionalOddsRatio` has limits there.
 * @param table four counts
 * @throws RangeError where a cell is no count (a whole number from 0 up) or the level is not inside (0, 1)
 */
export function oddsRatio(table: FourfoldTable): RatioEstimate {
  const { a, b, c, d, level = 0.95 } = table;
  requireTable(table);
  const z = criticalValue(level);
  const about = { level, method: methodOf('oddsRatio'), n: a + b + c + d, events: a + c, leftOut: [] };
  const estimate = ratioOf(a * d, b * c);
  if (a === 0 || b === 0 || c === 0 || d === 0) {
    return { estimate, lower: null, upper: null, standardErrorLog: null, reason: 'A zero cell has no log odds.', ...about };
  }
  const standardErrorLog = Math.sqrt(1 / a + 1 / b + 1 / c + 1 / d);
  const reach = Math.exp(z * standardErrorLog);
  const ratio = (a * d) / (b * c);
  return { estimate, lower: ratio / reach, upper: ratio * reach, standardErrorLog, ...about };
}
