import { z } from 'zod';
import { takeBack } from '@/lib/auth/hand-over';
import { plainRoute } from '@/lib/web/plain-route';
import { sessionToken } from '@/lib/web/session';
import { Refusal } from '@/lib/work/refusal';

const input = z.strictObject({ password: z.string().min(1, 'Write your password.').max(256) });

export const POST = plainRoute('session.hand-over', async (body) => {
  const { password } = input.parse(body);
  const token = await sessionToken();
  if (!token) throw new Refusal('unauthenticated', 'Sign in first.');
  return takeBack(token, password);
});
