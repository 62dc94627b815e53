import { bootstrapLimits } from '@/stats/bootstrap/bootstrap-limits';
import { observed } from '@/stats/bootstrap/resample';
import { drawingOf, runRange, statisticOf, type BootstrapTask } from '@/stats/bootstrap/task';
import type { Refusal } from '@/stats/model/fit';
import { mixedModel } from '@/stats/model/mixed-model';
import { negativeBinomial } from '@/stats/model/negative-binomial';
import { poissonRegression } from '@/stats/model/poisson-regression';
import { theilSen } from '@/stats/progression/theil-sen';
import { nextDouble } from '@/stats/random/source';
import { Xoshiro128 } from '@/stats/random/xoshiro128';
import { followUpColumns } from './generate';
import type { BenchTask, Columns } from './task';

const WEEKS = 52;
const REPLICATES = 2_000;
const TAU = 730;

function drawsFrom(seed: number): { uniform(): number; normal(): number } {
  const source = Xoshiro128.fromSeed(seed);
  const uniform = (): number => nextDouble(source) + 2 ** -54;
  return { uniform, normal: () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform()) };
}

/** n rows: people by 52 weeks, log load with an own level and slope each. */
function weeklyLoads(n: number): Columns {
  const { normal } = drawsFrom(31);
  const [id, week, y] = [new Float64Array(n), new Float64Array(n), new Float64Array(n)];
  for (let row = 0, level = 0, slope = 0; row < n; row++) {
    const at = row % WEEKS;
    if (at === 0) {
      level = normal();
      slope = 0.2 * level + Math.sqrt(0.96) * normal();
    }
    [id[row], week[row], y[row]] = [Math.floor(row / WEEKS), at, 1.8 + 0.35 * level + (0.02 + 0.008 * slope) * at + 0.1 * normal()];
  }
  return { id, week, y };
}

/** Loads to half a kilogram in weeks 0 to 51, a steady rise with scatter: heavy ties in both columns. */
function loadsByWeek(n: number): Columns {
  const { uniform, normal } = drawsFrom(51);
  const columns = { week: new Float64Array(n), load: new Float64Array(n) };
  for (let row = 0; row < n; row++) {
    const week = Math.floor(WEEKS * uniform());
    [columns.week[row], columns.load[row]] = [week, Math.max(0, Math.round(2 * (5 + 0.21 * week + 4 * normal())) / 2)];
  }
  return columns;
}

/** Overdispersed counts over 0.3 to 2.3 years. */
function eventCounts(n: number): Columns {
  const { uniform, normal } = drawsFrom(41);
  const columns = { y: new Float64Array(n), x: new Float64Array(n), g: new Float64Array(n), py: new Float64Array(n) };
  for (let row = 0; row < n; row++) {
    const [x, g, py] = [normal(), uniform() < 0.5 ? 1 : 0, 0.3 + 2 * uniform()];
    const mean = py * Math.exp(-0.3 + 0.3 * x + 0.4 * g) * (0.4 - 0.6 * Math.log(uniform()));
    let count = 0;
    for (let left = Math.exp(-mean), below = left, u = uniform(); u > below && count < 500; below += left) left *= mean / ++count;
    [columns.y[row], columns.x[row], columns.g[row], columns.py[row]] = [count, x, g, py];
  }
  return columns;
}

function countTask(name: string, against: string, run: (input: Parameters<typeof poissonRegression>[0]) => readonly number[]): BenchTask {
  return {
    name,
    against,
    limit: 0.5,
    sizes: [25e3, 5e4, 1e5],
    memorySize: 5e5,
    runs: 3,
    // R stops at a relative change of the deviance of 1e-8, and its standard errors are those of the step before.
    tolerance: 1e-4,
    data: eventCounts,
    prepare({ y, x, g, py }) {
      const input = { y: y!, terms: [{ name: 'x', values: x! }, { name: 'g', values: g! }], exposure: py! };
      return { inputBytes: 4 * y!.byteLength, run: () => run(input) };
    },
  };
}

function fitted<T extends { fitted: true }>(answer: T | Refusal): T {
  if (!answer.fitted) throw new Error(answer.reason);
  return answer;
}

export const modelTasks: readonly BenchTask[] = [
  {
    name: 'mixed-model-52-weeks',
    against: 'lmer(y ~ week + (week | id))',
    limit: 0.5,
    sizes: [500 * WEEKS, 1_000 * WEEKS, 2_000 * WEEKS],
    memorySize: 10_000 * WEEKS,
    runs: 5,
    // lmer stops a little short of the optimum here: its deviance is right to 1e-6, its variances only to 1e-2.
    tolerance: 1e-5,
    data: weeklyLoads,
    prepare({ id, week, y }) {
      return {
        inputBytes: 3 * y!.byteLength,
        run() {
          const fit = fitted(mixedModel({ y: y!, fixed: [{ name: 'week', values: week! }], person: id!, slope: week! }));
          return [fit.deviance, ...fit.fixed.map(({ estimate }) => estimate!)];
        },
      };
    },
  },
  {
    name: 'bootstrap-2000-rmst',
    against: 'boot(d, KM restricted mean, 2000)',
    limit: 0.5,
    sizes: [250, 500, 1_000],
    memorySize: 2e5,
    runs: 5,
    // The estimate agrees to the last digits; two seeded runs of 2 000 agree in their standard error to Monte-Carlo error.
    tolerance: 0.1,
    data: followUpColumns,
    prepare({ day, cause }) {
      const event = Uint8Array.from(cause!, (value) => (value === 1 ? 1 : 0));
      const task: BootstrapTask = { statistic: 'rmst', time: day!, event, tau: TAU };
      return {
        inputBytes: day!.byteLength + event.byteLength,
        run() {
          const replicates = runRange(task, { seed: 1, from: 0, to: day!.length > 1e4 ? 20 : REPLICATES });
          const estimate = observed(statisticOf(task), drawingOf(task));
          return [estimate, bootstrapLimits(estimate, replicates, { kind: 'percentile', n: day!.length }).se!];
        },
      };
    },
  },
  {
    name: 'theil-sen',
    against: 'every pair by outer(), its median and the two order statistics',
    limit: 0.5,
    sizes: [1e4, 3e4, 1e5],
    comparedSize: 2_500,
    memorySize: 5e5,
    runs: 5,
    tolerance: 1e-9,
    data: loadsByWeek,
    prepare({ week, load }) {
      return {
        inputBytes: 2 * week!.byteLength,
        run() {
          const { estimate, lower, upper, kendallS } = theilSen(week!, load!);
          return [estimate!, lower!, upper!, kendallS];
        },
      };
    },
  },
  countTask('poisson-offset', 'glm(y ~ x + g + offset(log(py)), poisson)', (input) => {
    const { coefficients } = fitted(poissonRegression(input));
    return [...coefficients.map(({ estimate }) => estimate!), ...coefficients.map(({ se }) => se)];
  }),
  countTask('negative-binomial-offset', 'glm.nb(y ~ x + g + offset(log(py)))', (input) => {
    const { coefficients, theta } = fitted(negativeBinomial(input));
    return [...coefficients.map(({ estimate }) => estimate!), ...coefficients.map(({ se }) => se), theta!];
  }),
];
