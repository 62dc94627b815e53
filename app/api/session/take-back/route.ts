import { z } from 'zod';
import { takeBack } from '@/lib/auth/hand-over';
import { plainRoute } from '@/lib/web/plain-route';
import { requireToken } from '@/lib/web/session';

export const POST = plainRoute({
  act: 'session.hand-over',
  summary: 'Take the tablet back with one’s own password',
  input: z.strictObject({ password: z.string().min(1, 'Write your password.').max(256) }),
  receive: async ({ password }) => takeBack(await requireToken(), password),
});
