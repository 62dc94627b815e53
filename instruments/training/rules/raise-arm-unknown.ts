import { defineTrainingRule } from '../define-training-rule';
import { exampleLoad } from './example-load';
import { weeklyRise } from '../load-facts';
import { LOAD_EPSILON_KG } from '../settings';

/** Any rise with the arm check unanswered. LOAD-08. */
export const raiseArmUnknown = defineTrainingRule({
  code: 'RAISE_ARM_UNKNOWN',
  title: 'Raised without an arm check',
  severity: 'deviation',
  scope: 'load',
  applies: (facts) => (weeklyRise(facts) ?? 0) > LOAD_EPSILON_KG && facts.arm === 'unknown',
  examples: {
    passes: exampleLoad({ '2024-01-08': 2, '2024-01-15': 3 }, 'clear'),
    fires: exampleLoad({ '2024-01-08': 2, '2024-01-15': 3 }, 'unknown'),
  },
});
