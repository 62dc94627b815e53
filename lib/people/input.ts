import { z } from 'zod';
import { newPassword } from '@/lib/auth/password-input';

/** What joining takes: the link's token and the password that was chosen. */
export const joinInput = z.strictObject({ token: z.string().min(20, 'This link is not whole. Open it from the letter again.').max(200), password: newPassword });
export type JoinInput = z.output<typeof joinInput>;
