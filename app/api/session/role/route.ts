import { z } from 'zod';
import { chooseRole } from '@/lib/auth/session';
import { plainRoute } from '@/lib/web/plain-route';
import { requireToken } from '@/lib/web/session';

export const POST = plainRoute({
  act: 'session.choose-role',
  summary: 'Take up another of one’s own roles',
  input: z.strictObject({ grantId: z.uuid() }),
  receive: async ({ grantId }) => {
    await chooseRole(await requireToken(), grantId);
    return { chosen: true };
  },
});
