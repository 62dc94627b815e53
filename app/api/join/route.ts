import { joinInput } from '@/lib/people/input';
import { join } from '@/lib/people/join';
import { plainRoute } from '@/lib/web/plain-route';
import { originOf } from '@/lib/web/request';

// Counts wrong links although it refuses them, so it opens its own work.
export const POST = plainRoute({
  act: 'account.join',
  summary: 'Join by an invitation link and set a password',
  input: joinInput,
  receive: (input, request) => join(input, { from: originOf(request) }),
});
