import { closeQueries } from '@/lib/queries/close-queries';
import { closeQueriesInput } from '@/lib/queries/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'query.close', summary: 'Close several answered queries', input: closeQueriesInput, create: true, run: closeQueries });
