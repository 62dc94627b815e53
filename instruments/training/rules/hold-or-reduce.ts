import { defineTrainingRule } from '../define-training-rule';
import { exampleLoad } from './example-load';
import { LOAD_EPSILON_KG } from '../settings';

/** Raised after a gap that is no full break; off unless the protocol sets the days. Common practice, no source. */
export const holdOrReduce = defineTrainingRule({
  code: 'HOLD_OR_REDUCE',
  title: 'Raised after some time off',
  severity: 'advice',
  scope: 'load',
  applies: ({ gapDays, isAfterBreak, previous, load }, { shortBreakDays }) => {
    if (shortBreakDays === null || gapDays === null || previous === null) return false;
    return !isAfterBreak && gapDays >= shortBreakDays && load > previous.load + LOAD_EPSILON_KG;
  },
  examples: {
    passes: exampleLoad({ '2024-01-08': 2, '2024-01-29': 2 }),
    fires: exampleLoad({ '2024-01-08': 2, '2024-01-29': 3 }),
  },
});
