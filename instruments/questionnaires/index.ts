import { armSymptoms } from './arm-symptoms';
import { dailyTasks } from './daily-tasks';
import type { Questionnaire } from './define-questionnaire';
import { liftingConfidence } from './lifting-confidence';

/** Every questionnaire, in alphabetical order of key; an older version stays beside its successor. */
export const questionnaires: readonly Questionnaire[] = [armSymptoms, dailyTasks, liftingConfidence];

/** The given version, or the newest of the key. */
export function findQuestionnaire(key: string, version?: number): Questionnaire | undefined {
  return questionnaires
    .filter((questionnaire) => questionnaire.key === key && (version === undefined || questionnaire.version === version))
    .toSorted((a, b) => b.version - a.version)[0];
}
