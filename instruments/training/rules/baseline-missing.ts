import { defineTrainingRule } from '../define-training-rule';

/** No complete measurement of both arms on or before the first session; raised once. LOAD-03. */
export const baselineMissing = defineTrainingRule({
  code: 'BASELINE_MISSING',
  title: 'No baseline before training',
  severity: 'deviation',
  scope: 'session',
  applies: ({ isFirst, baselineOn, on }) => isFirst && (baselineOn === null || baselineOn > on),
  examples: {
    passes: { on: '2024-01-08', isFirst: true, baselineOn: '2024-01-08', armChanged: false, isWaiting: false },
    fires: { on: '2024-01-08', isFirst: true, baselineOn: null, armChanged: false, isWaiting: false },
  },
});
