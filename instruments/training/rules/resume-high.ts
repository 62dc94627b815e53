import { defineTrainingRule } from '../define-training-rule';
import { exampleLoad } from './example-load';
import { resumeWindow } from '../load-facts';
import { LOAD_EPSILON_KG } from '../settings';

/** After a break, above 80 % of the load before it. Where no step of the equipment fits the window, the old load is no deviation. LOAD-12, LOAD-13, LOAD-32. */
export const resumeHigh = defineTrainingRule({
  code: 'RESUME_HIGH',
  title: 'Resumed too high after a break',
  severity: 'deviation',
  scope: 'load',
  applies: ({ isBand, isAfterBreak, previous, load }, settings) => {
    if (isBand || !isAfterBreak || previous === null) return false;
    const { toKg, isFeasible } = resumeWindow(previous.load, settings);
    return load > (isFeasible ? toKg : previous.load) + LOAD_EPSILON_KG;
  },
  examples: {
    passes: exampleLoad({ '2024-03-25': 8, '2024-04-22': 6.4 }),
    fires: exampleLoad({ '2024-03-25': 8, '2024-04-22': 8 }),
  },
});
