import type { TrainingRule, TrainingRuleCode } from './define-training-rule';
import { assessmentRequired } from './rules/assessment-required';
import { baselineMissing } from './rules/baseline-missing';
import { holdOrReduce } from './rules/hold-or-reduce';
import { raiseArmUnknown } from './rules/raise-arm-unknown';
import { raiseWithoutClearArm } from './rules/raise-without-clear-arm';
import { raisedEarly } from './rules/raised-early';
import { raisedSoon } from './rules/raised-soon';
import { raisedWithinWeek } from './rules/raised-within-week';
import { resumeHigh } from './rules/resume-high';
import { resumeLow } from './rules/resume-low';
import { startHigh } from './rules/start-high';
import { stepHard } from './rules/step-hard';
import { stepOver } from './rules/step-over';
import { trainedBeforeAssessment } from './rules/trained-before-assessment';

/** Every training rule, in alphabetical order of code. */
export const trainingRules: readonly TrainingRule[] = [
  assessmentRequired,
  baselineMissing,
  holdOrReduce,
  raisedEarly,
  raisedSoon,
  raisedWithinWeek,
  raiseArmUnknown,
  raiseWithoutClearArm,
  resumeHigh,
  resumeLow,
  startHigh,
  stepHard,
  stepOver,
  trainedBeforeAssessment,
];

export function trainingRule(code: TrainingRuleCode): TrainingRule {
  const found = trainingRules.find((rule) => rule.code === code);
  if (!found) throw new RangeError(`There is no training rule ${code}.`);
  return found;
}
