import type { ExtractFileDefinition } from '../define-extract-file';
import { limbAssessments, limbGirths, visits } from './limbs';
import { participants } from './participants';
import { questionnaireItems, questionnaireScores } from './questionnaires';
import { symptomReports } from './symptom-reports';
import { trainingSessions, trainingSets } from './training';

/** Every data file of an extract, alphabetical by name. */
export const extractFiles: readonly ExtractFileDefinition[] = [
  limbAssessments,
  limbGirths,
  participants,
  questionnaireItems,
  questionnaireScores,
  symptomReports,
  trainingSessions,
  trainingSets,
  visits,
];
