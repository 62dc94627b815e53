import { defineTrainingRule } from '../define-training-rule';

/** A 'yes' to the arm check asks for both arms to be measured. LOAD-07. */
export const assessmentRequired = defineTrainingRule({
  code: 'ASSESSMENT_REQUIRED',
  title: 'The arm changed',
  severity: 'safety',
  scope: 'session',
  applies: ({ armChanged }) => armChanged === true,
  examples: {
    passes: { on: '2024-01-15', isFirst: false, baselineOn: '2024-01-02', armChanged: false, isWaiting: false },
    fires: { on: '2024-01-15', isFirst: false, baselineOn: '2024-01-02', armChanged: true, isWaiting: false },
  },
});
