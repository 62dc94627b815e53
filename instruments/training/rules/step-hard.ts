import { defineTrainingRule, type LoadFacts } from '../define-training-rule';
import { LOAD_EPSILON_KG, type TrainingSettings } from '../settings';
import { exampleLoad } from './example-load';

/** A rise from the previous session that counts as a large jump, at any gap. */
export function isJump({ isBand, load, previous }: LoadFacts, { jumpKg }: TrainingSettings): boolean {
  return !isBand && previous !== null && load - previous.load >= jumpKg - LOAD_EPSILON_KG;
}

/** A large jump from the session before: the site is told, and the participant asked to be in touch before the next session. LOAD-06. */
export const stepHard = defineTrainingRule({
  code: 'STEP_HARD',
  title: 'A large jump',
  severity: 'safety',
  scope: 'load',
  applies: isJump,
  examples: {
    passes: exampleLoad({ '2024-01-08': 2, '2024-01-15': 6.9 }),
    fires: exampleLoad({ '2024-01-08': 2, '2024-01-15': 7 }),
  },
});
