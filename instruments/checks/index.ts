import { armsIdentical, armsLevels } from './arms';
import { assessorDigits, assessorRepeats } from './assessor';
import { dateBeforeConsent, dateInFuture, dateOrder, sessionLate } from './dates';
import type { RegisteredCheck } from './define-edit-check';
import { girthLimit, girthRange } from './girth';
import { armVolume, bodyMassIndex, height, impedance, impedanceRatioRange, interLimbAtBaseline, weight } from './measured-ranges';
import { answersAllSame, answersFast } from './questionnaire-answers';
import { sessionDuplicate, sessionInPounds, sessionsIdentical } from './session-patterns';
import { sessionEffort, sessionLoadKg, sessionMinutes, sessionReps, sessionSets } from './session-ranges';
import { atRiskChange, copiedForward, methodChanged, unaffectedChange, weightChange } from './since-last-visit';
import { armsSwapped } from './swap';
import { taperImpossible, taperUnusual } from './taper';
import { trialsDiffer, trialsFarApart } from './trials';

/** Every edit check, in alphabetical order of id. */
export const editChecks: readonly RegisteredCheck[] = [
  answersAllSame,
  answersFast,
  armVolume.limit,
  armVolume.range,
  copiedForward,
  armsIdentical,
  armsLevels,
  armsSwapped,
  assessorDigits,
  assessorRepeats,
  atRiskChange.limit,
  atRiskChange.range,
  bodyMassIndex.limit,
  bodyMassIndex.range,
  dateBeforeConsent,
  dateInFuture,
  dateOrder,
  girthLimit,
  girthRange,
  height.limit,
  height.range,
  impedanceRatioRange.limit,
  impedanceRatioRange.range,
  impedance.limit,
  impedance.range,
  interLimbAtBaseline.limit,
  interLimbAtBaseline.range,
  methodChanged,
  sessionEffort.limit,
  sessionLoadKg.limit,
  sessionLoadKg.range,
  sessionMinutes.limit,
  sessionMinutes.range,
  sessionReps.limit,
  sessionReps.range,
  sessionSets.limit,
  sessionSets.range,
  sessionDuplicate,
  sessionsIdentical,
  sessionLate,
  sessionInPounds,
  taperImpossible,
  taperUnusual,
  trialsDiffer,
  trialsFarApart,
  unaffectedChange.limit,
  unaffectedChange.range,
  weightChange.limit,
  weightChange.range,
  weight.limit,
  weight.range,
];

export function findEditCheck(id: string): RegisteredCheck | undefined {
  return editChecks.find((check) => check.id === id);
}
