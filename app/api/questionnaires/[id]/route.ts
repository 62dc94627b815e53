import { questionnaireIdInput, saveAnswersInput } from '@/lib/questionnaires/input';
import { saveAnswers } from '@/lib/questionnaires/save-answers';
import { viewQuestionnaire } from '@/lib/questionnaires/view-questionnaire';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'questionnaire.view', summary: 'Show a questionnaire with the answers kept so far', input: questionnaireIdInput, run: viewQuestionnaire });
export const PUT = route({ act: 'questionnaire.save', summary: 'Keep the answers given so far', input: saveAnswersInput, change: true, run: saveAnswers });
