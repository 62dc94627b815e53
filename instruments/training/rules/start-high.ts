import { defineTrainingRule } from '../define-training-rule';
import { exampleLoad } from './example-load';
import { toleranceFor } from '../load-facts';

/** The first load of a history lies above the start. Equipment is not exempt. LOAD-02, LOAD-11, LOAD-19. */
export const startHigh = defineTrainingRule({
  code: 'START_HIGH',
  title: 'First load above the start',
  severity: 'deviation',
  scope: 'load',
  applies: (facts, settings) => !facts.isBand && facts.previous === null && facts.load > settings.startKg + toleranceFor(facts, settings),
  examples: {
    passes: exampleLoad({ '2024-01-08': 2 }),
    fires: exampleLoad({ '2024-01-08': 3 }),
  },
});
