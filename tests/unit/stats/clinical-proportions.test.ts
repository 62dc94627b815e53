/**
 * Published trial figures (tests/reference/clinical-checks.json) from their
 * counts. Figures known not to follow from the counts are checked the other
 * way round: no method here gives them, and the reason stands beside each.
 */
import { describe, expect, test } from 'vitest';
import { chiSquareTest } from '@/stats/proportion/chi-square-test';
import { clopperPearson } from '@/stats/proportion/clopper-pearson';
import { fisherExact } from '@/stats/proportion/fisher-exact';
import { katzRiskRatio } from '@/stats/proportion/katz-risk-ratio';
import { koopmanRiskRatio } from '@/stats/proportion/koopman-risk-ratio';
import { miettinenNurminenDifference } from '@/stats/proportion/miettinen-nurminen-difference';
import { newcombeDifference } from '@/stats/proportion/newcombe-difference';
import { oddsRatio } from '@/stats/proportion/odds-ratio';
import { waldDifference } from '@/stats/proportion/wald-difference';
import { waldProportion } from '@/stats/proportion/wald-proportion';
import { wilsonInterval } from '@/stats/proportion/wilson-interval';
import { digitPreference } from '@/stats/quality/digit-preference';
import { intervalSymmetry } from '@/stats/quality/interval-symmetry';
import { pFromInterval, type PublishedInterval } from '@/stats/quality/p-from-interval';
import { exactRate } from '@/stats/rate/exact-rate';
import { personTime } from '@/stats/rate/person-time';
import { rateRatioExact } from '@/stats/rate/rate-ratio-exact';
import { rateRatioWald } from '@/stats/rate/rate-ratio-wald';
import type { Interval } from '@/stats/result';
import { differences, readReference } from './reference';

interface Check {
  readonly id: string;
  readonly kind: string;
  readonly inputs: Readonly<Record<string, unknown>>;
  readonly expected: Readonly<Record<string, unknown>>;
  readonly tolerance: number;
}

const checks = readReference('clinical-checks.json') as Check[];
const limits = ({ lower, upper }: Interval) => [lower, upper];
const numbers = (inputs: Check['inputs']) => inputs as Record<string, number>;

const answers: Readonly<Record<string, (inputs: Check['inputs']) => Record<string, unknown>>> = {
  single_proportion: (inputs) => {
    const group = { events: numbers(inputs).events as number, n: numbers(inputs).n as number };
    return {
      p: wilsonInterval(group).estimate,
      wald: limits(waldProportion(group)),
      wilson: limits(wilsonInterval(group)),
      clopper_pearson: limits(clopperPearson(group)),
    };
  },
  two_proportions: (inputs) => compareTwo(numbers(inputs) as unknown as Counts),
  p_from_ci: (inputs) => {
    const { estimate, lo, hi, scale } = inputs as { estimate: number; lo: number; hi: number; scale: PublishedInterval['scale'] };
    const { standardError, z, p } = pFromInterval({ estimate, lower: lo, upper: hi, scale });
    return { se: standardError, z, p };
  },
  incidence_rate: (inputs) => {
    const { events, person_years, per } = numbers(inputs) as { events: number; person_years: number; per: number };
    const rate = exactRate({ events, personTime: person_years, per });
    return { rate: rate.estimate, exact_ci: limits(rate) };
  },
  rate_ratio: (inputs) => {
    const { events1, py1, events2, py2 } = numbers(inputs) as { events1: number; py1: number; events2: number; py2: number };
    const rates = { events1, personTime1: py1, events2, personTime2: py2 };
    const exact = rateRatioExact(rates);
    return { ratio: exact.estimate, exact_ci: limits(exact), p_exact: exact.pMinimumLikelihood, wald_ci: limits(rateRatioWald(rates)) };
  },
  person_time: (inputs) => {
    const intervals = inputs.intervals as [string, string, number][];
    const days = intervals.map(([from, to]) => (Date.parse(to) - Date.parse(from)) / 86_400_000);
    const { years } = personTime(days);
    const events = intervals.reduce((sum, [, , event]) => sum + event, 0);
    return { days, person_years: years, events, rate_per_100_py: exactRate({ events, personTime: years, per: 100 }).estimate };
  },
  digit_preference: (inputs) => {
    const result = digitPreference(inputs.terminal_digit_counts as number[]);
    return { n: result.n, chi2: result.statistic, df: result.degreesOfFreedom, p: result.p, share_0_or_5: result.shareZeroOrFive, flag: result.flag };
  },
  published_pooled_incidence: (inputs) => {
    const { estimate_pct, lo, hi } = numbers(inputs) as { estimate_pct: number; lo: number; hi: number };
    const check = intervalSymmetry({ estimate: estimate_pct / 100, lower: lo / 100, upper: hi / 100 });
    return {
      estimate_inside_interval: check.estimateInside,
      logit_asymmetry: check.asymmetry,
      lower_implied_by_logit_symmetry_pct: 100 * check.impliedLower,
    };
  },
};

interface Counts {
  readonly events1: number;
  readonly n1: number;
  readonly events2: number;
  readonly n2: number;
}

function compareTwo(groups: Counts) {
  const { events1, n1, events2, n2 } = groups;
  const table = { a: events1, b: n1 - events1, c: events2, d: n2 - events2 };
  const wald = waldDifference(groups);
  const eventFree = katzRiskRatio({ events1: n1 - events1, n1, events2: n2 - events2, n2 });
  const tests = chiSquareTest(table);
  const fisher = fisherExact(table);
  return {
    p1: events1 / n1,
    p2: events2 / n2,
    rd: wald.estimate,
    rd_wald: limits(wald),
    rd_newcombe: limits(newcombeDifference(groups)),
    rd_miettinen_nurminen: limits(miettinenNurminenDifference(groups)),
    rr: katzRiskRatio(groups).estimate,
    rr_katz: limits(katzRiskRatio(groups)),
    rr_koopman: limits(koopmanRiskRatio(groups)),
    odds_ratio: oddsRatio(table).estimate,
    or_woolf: limits(oddsRatio(table)),
    event_free_ratio: eventFree.estimate,
    event_free_ratio_katz: limits(eventFree),
    chi2: tests.pearson.statistic,
    p_chi2: tests.pearson.p,
    p_yates: tests.yates.p,
    p_lr: tests.likelihoodRatio.p,
    p_fisher: fisher.p,
    p_fisher_midp: fisher.pMid,
    p_wald: wald.p,
  };
}

describe.each(Object.keys(answers))('%s', (kind) => {
  const own = checks.filter((check) => check.kind === kind);
  test('has cases', () => expect(own.length).toBeGreaterThan(0));
  test.each(own)('$id', ({ inputs, expected, tolerance }) => {
    // What a paper printed is compared below, with what it must and cannot be.
    const { published: _published, published_note: _note, reproducible: _flag, ...computed } = expected;
    const answer = answers[kind] as (inputs: Check['inputs']) => unknown;
    // Nine digits are printed; the tolerance of the check is kept where it is tighter.
    expect(differences(answer(inputs), computed, { rel: Math.min(tolerance, 2e-8), abs: 1e-9 })).toEqual([]);
  });
});

function trial(id: string) {
  const check = checks.find((each) => each.id === id) as Check;
  const counts = check.inputs as unknown as Counts;
  return { answer: compareTwo(counts), published: check.expected.published as Record<string, number & number[]>, counts };
}

/** Every two-sided p the table admits. */
function allPs({ p_chi2, p_yates, p_lr, p_fisher, p_fisher_midp, p_wald }: ReturnType<typeof compareTwo>) {
  return [p_chi2, p_yates, p_lr, p_fisher, p_fisher_midp, p_wald] as number[];
}

/** Every interval of the difference, in percentage points. */
function differencesInPoints({ rd_wald, rd_newcombe, rd_miettinen_nurminen }: ReturnType<typeof compareTwo>) {
  return [rd_wald, rd_newcombe, rd_miettinen_nurminen].map((pair) => pair.map((limit) => 100 * (limit as number)));
}

describe('what was published and what the counts allow', () => {
  test('TRIAL-01: the printed interval is the Wald half-width about the difference of rounded percentages, not the interval of the counts', () => {
    const { answer, published } = trial('TRIAL-01');
    const [lower, upper] = published.ci_pct as unknown as [number, number];
    const [waldLower, waldUpper] = differencesInPoints(answer)[0] as [number, number];
    expect((upper - lower) / 2).toBeCloseTo((waldUpper - waldLower) / 2, 1);
    expect(published.cid_pct).toBe(11 - 17);
    expect(Math.abs(waldLower - lower)).toBeGreaterThan(0.2);
  });

  test('TRIAL-02: no method gives -18.6 to -11.4, because counts of 3 in 45 and 11 in 49 cannot hold a difference to 3.6 points', () => {
    const { answer, published } = trial('TRIAL-02');
    const [lower, upper] = published.ci_pct as unknown as [number, number];
    for (const [from, to] of differencesInPoints(answer) as [number, number][]) {
      expect((to - from) / 2).toBeGreaterThan(3 * ((upper - lower) / 2));
    }
  });

  test('TRIAL-04: the printed P of 0.04 is chi-square or Fisher, not Yates', () => {
    const { answer } = trial('TRIAL-04');
    expect([answer.p_chi2, answer.p_fisher].map((p) => (p as number).toFixed(2))).toEqual(['0.04', '0.04']);
    expect((answer.p_yates as number).toFixed(2)).not.toBe('0.04');
  });

  test('TRIAL-06: the printed ratio of cumulative incidence is that of the event-free; the ratio of events is far wider', () => {
    const { answer, published } = trial('TRIAL-06');
    const [lower, upper] = published.ci as unknown as [number, number];
    const free = answer.event_free_ratio_katz as [number, number];
    expect(free[0]).toBeCloseTo(lower, 1);
    expect(free[1]).toBeCloseTo(upper, 2);
    const [eventLower, eventUpper] = answer.rr_katz as [number, number];
    expect(eventLower).toBeLessThan(lower / 2);
    expect(eventUpper).toBeGreaterThan(2 * upper);
  });

  test('TRIAL-07: the printed P of 0.011 is uncorrected chi-square or Fisher; Yates gives 0.013', () => {
    const { answer, published } = trial('TRIAL-07');
    expect(Number((answer.p_chi2 as number).toFixed(3))).toBe(published.p);
    expect(Number((answer.p_fisher as number).toFixed(3))).toBe(published.p);
    expect(Number((answer.p_yates as number).toFixed(3))).not.toBe(published.p);
  });

  test('TRIAL-08: the printed difference is Wald exactly; the printed ratio limits and P follow from no method, so from other data or a model', () => {
    const { answer, published } = trial('TRIAL-08');
    const wald = differencesInPoints(answer)[0] as [number, number];
    expect([-wald[1], -wald[0]].map((limit) => limit.toFixed(1))).toEqual((published.ci_pct as unknown as number[]).map((limit) => limit.toFixed(1)));
    const [lower, upper] = published.rr_ci as unknown as [number, number];
    for (const pair of [answer.rr_katz, answer.rr_koopman] as [number, number][]) {
      expect(Math.abs(pair[0] - lower)).toBeGreaterThan(0.04);
      expect(Math.abs(pair[1] - upper)).toBeGreaterThan(0.05);
    }
    for (const p of allPs(answer)) expect(p.toFixed(3)).not.toBe('0.016');
  });

  test('TRIAL-09: the printed P of 0.130 follows from no test of the inferred counts', () => {
    for (const p of allPs(trial('TRIAL-09').answer)) expect(p.toFixed(3)).not.toBe('0.130');
  });

  test('PUB-03-6: the sentinel row prints an estimate outside its own interval, and no lower limit in it is symmetric', () => {
    const row = checks.find(({ id }) => id === 'PUB-03-6') as Check;
    const { estimate_pct, lo, hi } = row.inputs as { estimate_pct: number; lo: number; hi: number };
    const check = intervalSymmetry({ estimate: estimate_pct / 100, lower: lo / 100, upper: hi / 100 });
    expect(check.estimateInside).toBe(false);
    expect(100 * check.impliedLower).toBeLessThan(4);
    const others = checks.filter(({ kind, id }) => kind === 'published_pooled_incidence' && id !== 'PUB-03-6');
    for (const { inputs } of others) {
      const own = inputs as { estimate_pct: number; lo: number; hi: number };
      const { asymmetry } = intervalSymmetry({ estimate: own.estimate_pct / 100, lower: own.lo / 100, upper: own.hi / 100 });
      expect(Math.abs(asymmetry)).toBeLessThan(Math.abs(check.asymmetry) / 50);
    }
  });
});
