/** Published and cross-checked figures of survival and incidence: tests/reference/clinical-checks.json. */
import { describe, expect, test } from 'vitest';
import { criticalValue } from '@/stats/critical-value';
import { cumulativeIncidence, incidenceAt } from '@/stats/survival/cumulative-incidence';
import { kaplanMeier } from '@/stats/survival/kaplan-meier';
import { type LimitKind, survivalLimit } from '@/stats/survival/limits';
import { logRank } from '@/stats/survival/log-rank';
import { numberAtRisk } from '@/stats/survival/number-at-risk';
import { quantileOf } from '@/stats/survival/quantile-of';
import { survivalAt } from '@/stats/survival/survival-at';
import { readReference } from './reference';

interface Check {
  readonly id: string;
  readonly kind: string;
  readonly inputs: Record<string, never>;
  readonly expected: Record<string, unknown>;
  readonly tolerance: number;
}

const z = criticalValue(0.95);
const all = readReference('clinical-checks.json') as Check[];
const ofKind = (kind: string) => {
  const found = all.filter((check) => check.kind === kind);
  expect(found.length, kind).toBeGreaterThan(0);
  return found;
};
const close = (got: number | null, want: number, tolerance: number) => expect(Math.abs(got! - want), `${got} for ${want}`).toBeLessThanOrEqual(tolerance);

describe('published figures of survival and incidence', () => {
  test('the limits of a published 24-month incidence are the log-log ones, not the plain ones', () => {
    for (const { inputs, expected, tolerance } of ofKind('km_loglog_ci')) {
      const { F_pct: incidence, greenwood_se_of_S: se } = inputs as Record<string, number>;
      const s = 1 - incidence! / 100;
      const limits = (kind: LimitKind) => [1, -1].map((side) => 100 * (1 - survivalLimit(s, se! / s, z, kind, side as 1 | -1)));
      const published = expected.published as number[];
      limits('log-log').forEach((limit, k) => {
        close(limit, [expected.lo_pct, expected.hi_pct][k] as number, 1e-6);
        close(limit, published[k]!, tolerance);
      });
      limits('plain').forEach((limit, k) => {
        close(limit, (expected.plain_ci_pct as number[])[k]!, 1e-6);
        expect(Math.abs(limit - published[k]!)).toBeGreaterThan(tolerance);
      });
      const onScale = (percent: number) => Math.log(-Math.log(1 - percent / 100));
      published.forEach((limit, k) => close(Math.abs(onScale(limit) - onScale(incidence!)), (expected.halfwidth_loglog as number[])[k]!, 1e-6));
    }
  });

  test('a printed table of Kaplan-Meier steps, three kinds of limits and the median', () => {
    for (const { inputs, expected } of ofKind('kaplan_meier')) {
      const { times, event } = inputs as unknown as { times: number[]; event: number[] };
      const data = { time: Float64Array.from(times), event: Uint8Array.from(event) };
      for (const row of expected.table as Record<string, number & number[]>[]) {
        expect(numberAtRisk(data, [row.time!])[0]).toBe(row.n_risk);
        for (const [kind, name] of [['log-log', 'loglog'], ['log', 'log'], ['plain', 'plain']] as const) {
          const at = survivalAt(kaplanMeier(data, { limits: kind }), row.time!);
          close(at.estimate, row.survival!, 1e-8);
          close(at.se, row.se!, 1e-8);
          close(at.lower, row[name]![0]!, 1e-8);
          close(at.upper, row[name]![1]!, 1e-8);
        }
      }
      expect(quantileOf(kaplanMeier(data), 0.5).estimate).toBe(expected.median);
    }
  });

  test('a two-group log-rank test', () => {
    for (const { inputs, expected } of ofKind('logrank')) {
      const groups = [inputs.group1, inputs.group2] as unknown as [number, number][][];
      const rows = groups.flatMap((rowsOf, group) => rowsOf.map(([time, event]) => ({ time, event, group })));
      const result = logRank({
        time: Float64Array.from(rows, ({ time }) => time),
        event: Uint8Array.from(rows, ({ event }) => event),
        group: Uint8Array.from(rows, ({ group }) => group),
      });
      expect(result.groups[0]!.observed).toBe(expected.observed1);
      close(result.groups[0]!.expected, expected.expected1 as number, 1e-6);
      close(result.chiSquare, expected.chi2 as number, 1e-6);
      close(result.p, expected.p as number, 1e-6);
    }
  });

  test('cumulative incidence with a competing cause, and how far one minus Kaplan-Meier overstates it', () => {
    for (const { inputs, expected, tolerance } of ofKind('cumulative_incidence_competing')) {
      const { times, status } = inputs as unknown as { times: number[]; status: number[] };
      const data = { time: Float64Array.from(times), cause: Uint8Array.from(status) };
      const curves = cumulativeIncidence(data);
      const table = expected.table as { time: number; cif_event: number; cif_competing: number; overall_survival: number }[];
      for (const row of table) {
        close(incidenceAt(curves, 1, row.time).estimate, row.cif_event, tolerance);
        close(incidenceAt(curves, 2, row.time).estimate, row.cif_competing, tolerance);
        close(curves.survival[curves.time.indexOf(row.time)]!, row.overall_survival, tolerance);
      }
      const naive = kaplanMeier({ time: data.time, event: data.cause.map((cause) => (cause === 1 ? 1 : 0)) });
      close(1 - naive.survival.at(-1)!, expected.one_minus_km_naive as number, tolerance);
      expect(1 - naive.survival.at(-1)!).toBeGreaterThan(table.at(-1)!.cif_event);
    }
  });
});
