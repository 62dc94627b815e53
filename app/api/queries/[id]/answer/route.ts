import { answerQuery } from '@/lib/queries/answer-query';
import { answerQueryInput } from '@/lib/queries/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'query.answer', summary: 'Answer a data query', input: answerQueryInput, change: true, run: answerQuery });
