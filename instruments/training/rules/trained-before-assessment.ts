import { defineTrainingRule } from '../define-training-rule';

/** A session while an earlier 'yes' still waits for its assessment. LOAD-09, LOAD-10. */
export const trainedBeforeAssessment = defineTrainingRule({
  code: 'TRAINED_BEFORE_ASSESSMENT',
  title: 'Trained before the arm was measured',
  severity: 'safety',
  scope: 'session',
  applies: ({ isWaiting }) => isWaiting,
  examples: {
    passes: { on: '2024-01-22', isFirst: false, baselineOn: '2024-01-02', armChanged: false, isWaiting: false },
    fires: { on: '2024-01-18', isFirst: false, baselineOn: '2024-01-02', armChanged: false, isWaiting: true },
  },
});
