import { defineTrainingRule } from '../define-training-rule';
import { exampleLoad } from './example-load';
import { LOAD_EPSILON_KG } from '../settings';

/** After a break, below half of the load before it; information only. LOAD-14. */
export const resumeLow = defineTrainingRule({
  code: 'RESUME_LOW',
  title: 'Resumed low after a break',
  severity: 'information',
  scope: 'load',
  applies: ({ isBand, isAfterBreak, previous, load }, { resumeFromFraction }) =>
    !isBand && isAfterBreak && previous !== null && load < previous.load * resumeFromFraction - LOAD_EPSILON_KG,
  examples: {
    passes: exampleLoad({ '2024-03-25': 8, '2024-04-22': 4 }),
    fires: exampleLoad({ '2024-03-25': 8, '2024-04-22': 3.5 }),
  },
});
