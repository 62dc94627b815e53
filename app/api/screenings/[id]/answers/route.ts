import { answerCriterion } from '@/lib/enrolment/answer-criterion';
import { answerCriterionInput } from '@/lib/enrolment/input';
import { route } from '@/lib/web/route';

export const PUT = route({ act: 'screening.answer', summary: 'Save the answer to one criterion', input: answerCriterionInput, change: true, run: answerCriterion });
