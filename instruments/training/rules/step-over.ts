import { defineTrainingRule } from '../define-training-rule';
import { exampleLoad } from './example-load';
import { toleranceFor, weeklyRise } from '../load-facts';
import { isJump } from './step-hard';

const ONE_BAND_LEVEL = 1;

/** From one active week to the next, more than the weekly step (bands: one level). A large jump replaces it. LOAD-05. */
export const stepOver = defineTrainingRule({
  code: 'STEP_OVER',
  title: 'More than the weekly step',
  severity: 'deviation',
  scope: 'load',
  applies: (facts, settings) => {
    const rise = weeklyRise(facts);
    const stepLimit = facts.isBand ? ONE_BAND_LEVEL : settings.weeklyStepKg;
    return rise !== null && rise > stepLimit + toleranceFor(facts, settings) && !isJump(facts, settings);
  },
  examples: {
    passes: exampleLoad({ '2024-01-08': 2, '2024-01-15': 4 }),
    fires: exampleLoad({ '2024-01-08': 2, '2024-01-15': 5 }),
  },
});
