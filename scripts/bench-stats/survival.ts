import { cox } from '@/stats/survival/cox';
import { cumulativeIncidence, incidenceAt } from '@/stats/survival/cumulative-incidence';
import { intervalOnset, onsetFreeAt } from '@/stats/survival/interval-onset';
import { kaplanMeier } from '@/stats/survival/kaplan-meier';
import { logRank } from '@/stats/survival/log-rank';
import { survivalAt } from '@/stats/survival/survival-at';
import { followUpColumns, onsetColumns } from './generate';
import type { BenchTask, Columns } from './task';

const TIMES = [365, 1000] as const;

function kaplanMeierTask(name: string, column: 'day' | 'time', tolerance: number): BenchTask {
  return {
    name,
    against: 'survfit(Surv(time, event) ~ 1, conf.type = "log-log")',
    limit: 0.5,
    sizes: [1e4, 1e5, 1e6],
    runs: 5,
    tolerance,
    data: followUpColumns,
    prepare(columns) {
      const time = columns[column]!;
      const event = eventOf(columns);
      return {
        inputBytes: time.byteLength + event.byteLength,
        run() {
          const curve = kaplanMeier({ time, event });
          const at = TIMES.map((t) => survivalAt(curve, t));
          return [...at.map(({ estimate }) => estimate!), ...at.map(({ se }) => se!), ...at.map(({ lower }) => lower!)];
        },
      };
    },
  };
}

function coxTask(name: string, column: 'day' | 'time', clustered: boolean, tolerance: number): BenchTask {
  return {
    name,
    against: `coxph(Surv(time, event) ~ x1 + x2 + x3 + x4 + x5${clustered ? ', cluster = site' : ''})`,
    limit: clustered ? 0.05 : 0.5,
    sizes: [25e3, 5e4, 1e5],
    memorySize: 5e5,
    runs: clustered ? 1 : 5,
    tolerance,
    data: followUpColumns,
    prepare(columns) {
      const x = ['x1', 'x2', 'x3', 'x4', 'x5'].map((name) => columns[name]!);
      const data = { time: columns[column]!, event: eventOf(columns), x, ...(clustered && { cluster: Uint8Array.from(columns.site!) }) };
      return {
        inputBytes: data.time.length * (8 + 1 + 40 + (clustered ? 1 : 0)),
        run() {
          const fit = cox(data);
          const errors = fit.coefficients.map(({ se, robustSe }) => (clustered ? robustSe! : se!));
          return [fit.logLikelihood, ...fit.coefficients.map(({ estimate }) => estimate!), ...errors];
        },
      };
    },
  };
}

function eventOf({ cause }: Columns): Uint8Array {
  return Uint8Array.from(cause!, (code) => (code === 1 ? 1 : 0));
}

export const survivalTasks: readonly BenchTask[] = [
  kaplanMeierTask('kaplan-meier-days', 'day', 1e-9),
  // survfit merges times closer than about 1e-8 of the whole: the eighth digit is its own.
  kaplanMeierTask('kaplan-meier-continuous', 'time', 1e-6),
  {
    name: 'log-rank-4-groups',
    against: 'survdiff(Surv(time, event) ~ group)',
    limit: 0.5,
    sizes: [1e4, 1e5, 1e6],
    runs: 5,
    tolerance: 1e-9,
    data: followUpColumns,
    prepare(columns) {
      const data = { time: columns.day!, event: eventOf(columns), group: Uint8Array.from(columns.group!) };
      return {
        inputBytes: 10 * data.time.length,
        run() {
          const result = logRank(data);
          return [result.chiSquare!, ...result.groups.map(({ expected }) => expected)];
        },
      };
    },
  },
  {
    name: 'aalen-johansen-days',
    against: 'survfit(Surv(time, factor(cause)) ~ 1), with its standard errors',
    limit: 0.5,
    sizes: [2500, 16e3, 1e5],
    memorySize: 1e6,
    runs: 3,
    tolerance: 1e-9,
    data: followUpColumns,
    prepare(columns) {
      const data = { time: columns.day!, cause: Uint8Array.from(columns.cause!) };
      return {
        inputBytes: 9 * data.time.length,
        run() {
          const curves = cumulativeIncidence(data);
          const at = TIMES.map((t) => incidenceAt(curves, 1, t));
          return [...at.map(({ estimate }) => estimate!), ...at.map(({ se }) => se!)];
        },
      };
    },
  },
  coxTask('cox-5-days-efron', 'day', false, 1e-6),
  coxTask('cox-5-continuous', 'time', false, 1e-6),
  coxTask('cox-5-days-cluster', 'day', true, 1e-6),
  {
    name: 'interval-onset',
    against: 'the same likelihood to the same KKT gap by EM and Newton in matrices (survfit stops early and takes a minute)',
    limit: 0.05,
    sizes: [2500, 5000, 1e4],
    memorySize: 3e5,
    runs: 1,
    tolerance: 1e-8,
    data: onsetColumns,
    prepare(columns) {
      const data = { left: columns.left!, right: columns.right! };
      return {
        inputBytes: 16 * data.left.length,
        run() {
          const fit = intervalOnset(data);
          return [fit.logLikelihood, ...TIMES.map((t) => onsetFreeAt(fit, t).upper)];
        },
      };
    },
  },
];
