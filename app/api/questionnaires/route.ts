import { listQuestionnairesInput } from '@/lib/questionnaires/input';
import { listQuestionnaires } from '@/lib/questionnaires/list-questionnaires';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'questionnaire.list', summary: 'List the questionnaires of the participant who is signed in', input: listQuestionnairesInput, run: listQuestionnaires });
