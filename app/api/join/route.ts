import { joinInput } from '@/lib/people/input';
import { join } from '@/lib/people/join';
import { plainRoute } from '@/lib/web/plain-route';
import { originOf } from '@/lib/web/request';

// Counts wrong links although it refuses them, so it opens its own work.
export const POST = plainRoute('account.join', (body, request) => join(joinInput.parse(body), { from: originOf(request) }));
