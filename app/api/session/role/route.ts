import { z } from 'zod';
import { chooseRole } from '@/lib/auth/session';
import { Refusal } from '@/lib/work/refusal';
import { plainRoute } from '@/lib/web/plain-route';
import { sessionToken } from '@/lib/web/session';

const input = z.strictObject({ grantId: z.uuid() });

export const POST = plainRoute('session.choose-role', async (body) => {
  const token = await sessionToken();
  if (!token) throw new Refusal('unauthenticated', 'Sign in first.');
  await chooseRole(token, input.parse(body).grantId);
  return { chosen: true };
});
