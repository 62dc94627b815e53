import { defineTrainingRule } from '../define-training-rule';
import { exampleLoad } from './example-load';
import { daysBetween } from '../../calendar';
import { lastRaiseOn, weeklyRise } from '../load-facts';
import { LOAD_EPSILON_KG } from '../settings';

/** A Sunday-to-Monday raise passes the calendar week; off unless the protocol sets the days. LOAD-23. */
export const raisedSoon = defineTrainingRule({
  code: 'RAISED_SOON',
  title: 'Raised soon after the last raise',
  severity: 'advice',
  scope: 'load',
  applies: (facts, { minDaysSinceRaise, breakDays }) => {
    const raisedOn = minDaysSinceRaise === null ? null : lastRaiseOn(facts.past, breakDays);
    if (minDaysSinceRaise === null || raisedOn === null || (weeklyRise(facts) ?? 0) <= LOAD_EPSILON_KG) return false;
    return daysBetween({ from: raisedOn, to: facts.on }) < minDaysSinceRaise;
  },
  examples: {
    passes: exampleLoad({ '2024-01-14': 2, '2024-01-22': 3 }),
    fires: exampleLoad({ '2024-01-14': 2, '2024-01-15': 3 }),
  },
});
