import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';
import { isPassword } from './password';
import { systemActor, type Actor } from './roles';
import { mayTry } from './throttle';

/**
 * Proves once more that the person at the screen is the one who signed in: before a signature, and when a tablet
 * comes back from a participant. Tries are counted, so that a tablet left in a hand is no place to guess.
 * @throws Refusal 'invalid' at 'password', or 'too-many'.
 */
export async function confirmPassword(actor: Actor, password: string): Promise<void> {
  const outcome = await withWork(systemActor(), 'account.sign-in', async (work) => {
    if (!(await mayTry(work, { bucket: `confirm ${actor.accountId}`, most: 8, withinSeconds: 900 }))) return 'too-many';
    const [found] = await work.sql<{ password_hash: string | null }>('select password_hash from credential where account_id = ?', [actor.accountId]);
    const right = await isPassword(found?.password_hash ?? null, password);
    await work.event('confirmation', actor.accountId, right ? {} : { why: 'password' });
    return right ? 'right' : 'wrong';
  });
  if (outcome === 'too-many') throw new Refusal('too-many', 'Too many tries. Wait 15 minutes, then sign again.', 'password');
  if (outcome === 'wrong') throw new Refusal('invalid', 'That is not your password. Capitals count.', 'password');
}
