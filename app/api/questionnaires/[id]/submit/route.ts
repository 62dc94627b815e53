import { submitAnswersInput } from '@/lib/questionnaires/input';
import { submitAnswers } from '@/lib/questionnaires/submit-answers';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'questionnaire.submit', summary: 'Submit a questionnaire and close it', input: submitAnswersInput, change: true, run: submitAnswers });
