import type { Draw } from './draw';
import { type Facts } from './person';

/** True relative volume change at a day since enrolment, as a ratio: what a perfect tape would find. */
export type Course = (day: number) => number;

/** Rises as an S from nothing to `peak`, and sinks back to a share of it where the swelling passes. */
function rise({ peak, onsetDay, rampDays, passes, settlesAt }: { peak: number; onsetDay: number; rampDays: number; passes: boolean; settlesAt: number }): Course {
  const middle = onsetDay + rampDays / 2;
  return (day) => {
    const up = peak / (1 + Math.exp((-6 * (day - middle)) / rampDays));
    if (!passes) return up;
    const down = 1 / (1 + Math.exp((-6 * (day - middle - rampDays - 90)) / 80));
    return up * (1 - (1 - settlesAt) * down);
  };
}

/**
 * The risk of a lasting change of 10 % or more within two years, by what is known to raise it. Ratios in the order of
 * published ones: dissection about four times sentinel biopsy (DiSipio 2013), BMI of 30 and over 1.6, nodal radiotherapy 1.7.
 */
function risk({ axillaryProcedure, radiotherapy, weightKg, heightMm }: Facts): number {
  const bmi = weightKg / (heightMm / 1000) ** 2;
  const odds = 0.05 * (axillaryProcedure === 'axillary-dissection' ? 3.4 : 1) * (bmi >= 30 ? 1.6 : 1) * (radiotherapy === 'regional-nodes' ? 1.7 : 1);
  return odds / (1 + odds);
}

export function inventCourse(draw: Draw, facts: Facts): Course {
  const slope = draw.normal(0, 0.008);
  const wander: Course = (day) => (slope * day) / 730;
  const kind = facts.cohort === 'swelling' ? draw.weighted([['none', 80], ['some', 14], ['clear', 6]] as const) : kindOf(draw, risk(facts));
  const onsetDay = draw.between(20, 560, 190, 130);
  const rampDays = draw.uniform(60, 240);
  const settlesAt = draw.uniform(0.1, 0.5);
  if (kind === 'none') return wander;
  const passes = draw.chance(kind === 'some' ? 0.35 : 0.18);
  const peak = kind === 'some' ? draw.uniform(0.04, 0.085) : draw.between(0.11, 0.32, 0.15, 0.04);
  const swelling = rise({ peak, onsetDay, rampDays, passes, settlesAt });
  return (day) => wander(day) + swelling(day);
}

const kindOf = (draw: Draw, share: number): 'none' | 'some' | 'clear' => {
  const drawn = draw.uniform(0, 1);
  if (drawn < share) return 'clear';
  return drawn < share * 1.9 ? 'some' : 'none';
};

/** A course through given points; flat before the first and after the last. */
export function courseThrough(points: readonly (readonly [day: number, change: number])[]): Course {
  return (day) => {
    const after = points.findIndex(([at]) => at >= day);
    if (after < 0) return points.at(-1)?.[1] ?? 0;
    const [toDay, to] = points[after] ?? [0, 0];
    const [fromDay, from] = points[after - 1] ?? [toDay, to];
    return toDay === fromDay ? to : from + ((to - from) * (day - fromDay)) / (toDay - fromDay);
  };
}
