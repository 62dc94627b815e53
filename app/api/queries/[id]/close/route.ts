import { closeQuery } from '@/lib/queries/close-query';
import { closeQueryInput } from '@/lib/queries/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'query.close', summary: 'Accept the answer and close a data query', input: closeQueryInput, change: true, run: closeQuery });
