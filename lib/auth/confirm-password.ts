import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';
import { isPassword } from './password';
import { systemActor, type Actor } from './roles';
import { clearTries, mayTry } from './throttle';

/**
 * Proves once more that the person at the screen is the one who signed in: before a signature, and when a tablet
 * comes back from a participant. Wrong tries are counted, so that a tablet left in a hand is no place to guess.
 * @throws Refusal 'invalid' at 'password', or 'too-many'.
 */
export async function confirmPassword(actor: Actor, password: string): Promise<void> {
  const bucket = `confirm ${actor.accountId}`;
  const fits = await withWork(systemActor(), 'account.sign-in', (work) => mayTry(work, { bucket, most: 8, withinSeconds: 900 }));
  if (!fits) throw new Refusal('too-many', 'Too many wrong tries. Wait 15 minutes, then try again.', 'password');
  const right = await withWork(systemActor(), 'account.sign-in', async (work) => {
    const [found] = await work.sql<{ password_hash: string | null }>('select password_hash from credential where account_id = ?', [actor.accountId]);
    const matches = await isPassword(found?.password_hash ?? null, password);
    await work.event('confirmation', actor.accountId, matches ? {} : { why: 'password' });
    if (matches) await clearTries(work, bucket);
    return matches;
  });
  if (!right) throw new Refusal('invalid', 'That is not your password. Capitals count.', 'password');
}
