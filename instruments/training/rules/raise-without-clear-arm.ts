import { defineTrainingRule } from '../define-training-rule';
import { exampleLoad } from './example-load';
import { weeklyRise } from '../load-facts';
import { LOAD_EPSILON_KG } from '../settings';

/** Any rise while the arm has changed or waits to be measured. LOAD-07, LOAD-09. */
export const raiseWithoutClearArm = defineTrainingRule({
  code: 'RAISE_WITHOUT_CLEAR_ARM',
  title: 'Raised although the arm was not clear',
  severity: 'safety',
  scope: 'load',
  applies: (facts) => (weeklyRise(facts) ?? 0) > LOAD_EPSILON_KG && (facts.arm === 'changed' || facts.arm === 'waiting'),
  examples: {
    passes: exampleLoad({ '2024-01-08': 2, '2024-01-15': 2 }, 'changed'),
    fires: exampleLoad({ '2024-01-08': 2, '2024-01-15': 3 }, 'changed'),
  },
});
