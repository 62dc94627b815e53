import { correctValue } from '@/lib/measurement/correct-value';
import { correctValueInput } from '@/lib/measurement/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'assessment.correct', summary: 'Correct a saved value with a reason', input: correctValueInput, change: true, run: correctValue });
