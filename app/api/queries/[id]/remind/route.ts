import { remindInput } from '@/lib/queries/input';
import { remind } from '@/lib/queries/remind';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'query.remind', summary: 'Remind the site of a data query', input: remindInput, change: true, run: remind });
