import { listQueries } from '@/lib/queries/list-queries';
import { listQueriesInput, raiseQueryInput } from '@/lib/queries/input';
import { raiseQuery } from '@/lib/queries/raise-query';
import { route } from '@/lib/web/route';

export const GET = route({ act: 'query.list', summary: 'List data queries', input: listQueriesInput, run: listQueries });
export const POST = route({ act: 'query.raise', summary: 'Raise a data query on a value', input: raiseQueryInput, create: true, run: raiseQuery });
