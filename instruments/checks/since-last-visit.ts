import { areComparable, type MethodIdentity } from '../measurement/comparable';
import { printNumber } from '../numbers';
import { isAbove } from '../threshold';
import { defineEditCheck, type EditCheck } from './define-edit-check';

/** One number before and now, in one unit. */
export interface BeforeAndNow {
  readonly before: number;
  readonly now: number;
}

/** Change in percent of the earlier value. */
export function changePct({ before, now }: BeforeAndNow): number {
  return 100 * (now / before - 1);
}

interface Subject {
  readonly stem: string;
  readonly title: string;
  readonly what: string;
  readonly since: string;
  readonly unit: string;
  readonly softPct: number;
  readonly hardPct: number;
  readonly source: string;
}

function changeChecks({ stem, title, what, since, unit, softPct, hardPct, source }: Subject): { limit: EditCheck<BeforeAndNow>; range: EditCheck<BeforeAndNow> } {
  // The sentence is shown before the sitting is saved, so it names the figure of today and the limit, and none from before.
  const say = (pair: BeforeAndNow, over: number): { message: string; value: number } => ({
    message: `${what} is ${printNumber(pair.now, Number.isInteger(pair.now) || unit === 'mL' ? 0 : 1)} ${unit} today, more than ${over} % away from ${since}. Look at it again, or keep it and say why.`,
    value: pair.now,
  });
  const size = (pair: BeforeAndNow): number => Math.abs(changePct(pair));
  return {
    limit: defineEditCheck({
      id: `${stem}.limit`, version: 2, severity: 'soft', uses: 'history', title: `${title}: a great change`, source,
      run: (pair) => (isAbove(size(pair), hardPct) ? say(pair, hardPct) : null),
      examplePass: { before: 100, now: 100 + hardPct }, exampleFires: { before: 100, now: 101 + hardPct },
    }),
    range: defineEditCheck({
      id: `${stem}.range`, version: 1, severity: 'soft', uses: 'history', title, source,
      run: (pair) => (isAbove(size(pair), softPct) && !isAbove(size(pair), hardPct) ? say(pair, softPct) : null),
      examplePass: { before: 100, now: 100 + softPct }, exampleFires: { before: 100, now: 101 + softPct },
    }),
  };
}

const PRACTICE = 'common practice, no source';

export const atRiskChange = changeChecks({ stem: 'at-risk-change', title: 'At-risk arm since the last visit', what: 'The at-risk arm', since: 'the last visit', unit: 'mL', softPct: 10, hardPct: 40, source: PRACTICE });
export const unaffectedChange = changeChecks({
  stem: 'unaffected-change', title: 'Unaffected arm since baseline', what: 'The unaffected arm', since: 'baseline', unit: 'mL', softPct: 15, hardPct: 30,
  source: 'median variation 10.5 %, Ancukiewicz 2012; check DQ-20',
});
export const weightChange = changeChecks({ stem: 'weight-change', title: 'Weight between visits within 6 months', what: 'Weight', since: 'the last visit', unit: 'kg', softPct: 10, hardPct: 30, source: PRACTICE });

export const copiedForward = defineEditCheck<{ readonly previousMm: readonly number[]; readonly nowMm: readonly number[] }>({
  id: 'arms.copied-forward',
  version: 1,
  severity: 'soft',
  uses: 'history',
  title: 'Every girth equals the last visit’s',
  source: PRACTICE,
  run({ previousMm, nowMm }) {
    const isCopy = nowMm.length > 2 && nowMm.length === previousMm.length && nowMm.every((girth, i) => girth === previousMm[i]);
    return isCopy ? { message: `All ${nowMm.length} girths are the same as at the last visit. Measure again, or keep them and say why.` } : null;
  },
  examplePass: { previousMm: [160, 190, 234], nowMm: [160, 191, 234] },
  exampleFires: { previousMm: [160, 190, 234], nowMm: [160, 190, 234] },
});

const tape: MethodIdentity = { method: 'frustum', map: { startOffsetMm: 0, stepMm: 40, levels: 11 }, deviceId: null, formulaVersion: '1' };

export const methodChanged = defineEditCheck<{ readonly baseline: MethodIdentity; readonly visit: MethodIdentity }>({
  id: 'method.changed',
  version: 1,
  severity: 'soft',
  uses: 'history',
  title: 'Measured otherwise than at baseline: no change is computed',
  source: 'Limits of agreement between tape and optical are −202 to 181 mL, doi 10.1055/s-0037-1606267; check DQ-22',
  run({ baseline, visit }) {
    const answer = areComparable(baseline, visit);
    return answer.comparable ? null : { message: answer.reason };
  },
  examplePass: { baseline: tape, visit: tape },
  exampleFires: { baseline: tape, visit: { ...tape, method: 'optical', map: null } },
});
