import { correctFact } from '@/lib/participants/correct-fact';
import { correctFactInput } from '@/lib/participants/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'participant.correct', summary: 'Correct a fact of a participant with a reason', input: correctFactInput, change: true, run: correctFact });
