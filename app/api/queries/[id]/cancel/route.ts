import { cancelQuery } from '@/lib/queries/cancel-query';
import { cancelQueryInput } from '@/lib/queries/input';
import { route } from '@/lib/web/route';

export const POST = route({ act: 'query.cancel', summary: 'Withdraw a data query', input: cancelQueryInput, change: true, run: cancelQuery });
