import { defineTrainingRule } from '../define-training-rule';
import { exampleLoad } from './example-load';
import { toleranceFor } from '../load-facts';

/** Above the week's first load in the same ISO week. Down and back up to it is allowed. LOAD-04, LOAD-20, LOAD-22. */
export const raisedWithinWeek = defineTrainingRule({
  code: 'RAISED_WITHIN_WEEK',
  title: 'Raised inside the week',
  severity: 'deviation',
  scope: 'load',
  applies: (facts, settings) => {
    const { firstLoadThisWeek, isAfterBreak, load } = facts;
    return firstLoadThisWeek !== null && !isAfterBreak && load > firstLoadThisWeek + toleranceFor(facts, settings);
  },
  examples: {
    passes: exampleLoad({ '2024-01-08': 2, '2024-01-10': 1, '2024-01-12': 2 }),
    fires: exampleLoad({ '2024-01-08': 2, '2024-01-10': 3 }),
  },
});
