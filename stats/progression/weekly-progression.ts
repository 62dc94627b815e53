import { methodOf } from '../registry';
import { moments } from './moments';
import { requireRange } from '../result';

/** How one participant's load moved over consecutive weeks, described and not tested. */
export interface WeeklyProgression {
  readonly method: string;
  readonly n: number;
  /** Least-squares slope over the week index 0, 1, 2 …; null below two weeks. */
  readonly slopePerWeek: number | null;
  /** Last minus first. */
  readonly totalChange: number | null;
  /** 100 x total change / first. */
  readonly percentChange: number | null;
  readonly weeksWithRaise: number;
  /** Largest rise from one week to the next; 0 where the load never rose. */
  readonly largestStep: number;
}

/**
 * Describes a run of weekly loads.
 *
 * @param loads one a week, in week order, above zero, in any one unit.
 * @throws RangeError for a load that is not a number above zero.
 * @see Draper & Smith, Applied Regression Analysis 1998, ch. 1
 */
export function weeklyProgression(loads: ArrayLike<number>): WeeklyProgression {
  const weeks = loads.length;
  let weeksWithRaise = 0;
  let largestStep = 0;
  for (let week = 0; week < weeks; week++) {
    requireRange(loads[week]! > 0 && loads[week]! < Infinity, `A load is above zero, not ${loads[week]} (week ${week}).`);
    const step = week === 0 ? 0 : loads[week]! - loads[week - 1]!;
    if (step > 0) weeksWithRaise++;
    largestStep = Math.max(largestStep, step);
  }
  const base = { method: methodOf('weeklyProgression'), n: weeks, weeksWithRaise, largestStep };
  if (weeks < 2) return { ...base, slopePerWeek: null, totalChange: null, percentChange: null };
  const totalChange = loads[weeks - 1]! - loads[0]!;
  return { ...base, slopePerWeek: slopeOverIndex(loads), totalChange, percentChange: (100 * totalChange) / loads[0]! };
}

function slopeOverIndex(loads: ArrayLike<number>): number {
  const { mean } = moments(loads);
  const middle = (loads.length - 1) / 2;
  let products = 0;
  let squares = 0;
  for (let week = 0; week < loads.length; week++) {
    products += (week - middle) * (loads[week]! - (mean as number));
    squares += (week - middle) ** 2;
  }
  return products / squares;
}
