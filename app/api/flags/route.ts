import { listReportsInput } from '@/lib/safety/input';
import { listFlags } from '@/lib/training/list-flags';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'symptom.list', summary: 'List the training flags that nobody has seen', input: listReportsInput, run: (work) => listFlags(work) });
