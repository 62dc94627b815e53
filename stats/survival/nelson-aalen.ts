import type { RiskTable } from './risk-table';

/**
 * Cumulative hazard at each distinct time, with Aalen's standard error (sum of d / n²).
 * @see Nelson, Technometrics 1972;14:945. Aalen, Ann Stat 1978;6:701
 * Takes the columns of a risk table, one entry a distinct time; the hazard has no unit
 */
export function nelsonAalen({ time, atRisk, eventsAt }: RiskTable): { time: Float64Array; hazard: Float64Array; se: Float64Array } {
  const hazard = new Float64Array(time.length);
  const se = new Float64Array(time.length);
  let sum = 0;
  let variance = 0;
  for (let g = 0; g < time.length; g++) {
    const n = atRisk[g]!;
    sum += eventsAt[g]! / n;
    variance += eventsAt[g]! / (n * n);
    hazard[g] = sum;
    se[g] = Math.sqrt(variance);
  }
  return { time, hazard, se };
}
