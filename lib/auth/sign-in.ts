import { systemActor } from './roles';
import { isPassword } from './password';
import { mayTry } from './throttle';
import { newToken, tokenHash } from './token';
import { withWork } from '@/lib/work/with-work';
import { secondsAfter } from '@/lib/work/time';

/** Sessions end after 12 hours whatever happens; idle ones sooner (see idleSeconds). */
export const sessionSeconds = 12 * 3600;

export interface SignInTry {
  readonly email: string;
  readonly password: string;
  /** Where the request came from, as far as it can be known. */
  readonly from: string;
}

/**
 * Checks an address and a password.
 * @returns the account id; 'too-many' when tried too often; null when they do not match (which of the two is not said).
 */
export async function verifySignIn({ email, password, from }: SignInTry): Promise<string | 'too-many' | null> {
  const address = email.trim().toLowerCase();
  return withWork(systemActor(), 'account.sign-in', async (work) => {
    const fits =
      (await mayTry(work, { bucket: `sign-in ${address}`, most: 10, withinSeconds: 900 })) &&
      (await mayTry(work, { bucket: `sign-in from ${from}`, most: 60, withinSeconds: 900 }));
    if (!fits) {
      await work.event('sign-in', 'refused', { why: 'too many tries' });
      return 'too-many';
    }
    const [found] = await work.sql<{ account_id: string; password_hash: string | null }>(
      `select c.account_id, c.password_hash from credential c join account a on a.id = c.account_id where c.email = ? and a.state = 'active'`,
      [address],
    );
    const right = await isPassword(found?.password_hash ?? null, password);
    await work.event('sign-in', right && found ? found.account_id : 'refused', right ? {} : { why: 'address or password' });
    if (!right || !found) return null;
    await work.sql('delete from rate_hit where bucket = ?', [tokenHash(`sign-in ${address}`)]);
    return found.account_id;
  });
}

/** Opens a session and returns its token, which only the browser keeps. */
export async function openSession(accountId: string): Promise<string> {
  const token = newToken();
  await withWork(systemActor(), 'account.sign-in', (work) =>
    work.sql('insert into app_session (account_id, token_hash, created_at, seen_at, expires_at) values (?, ?, ?, ?, ?)', [
      accountId,
      tokenHash(token),
      work.now,
      work.now,
      secondsAfter(work.now, sessionSeconds),
    ]),
  );
  return token;
}

/** Ends a session at once, wherever its cookie was copied to. */
export async function endSession(token: string): Promise<void> {
  await withWork(systemActor(), 'account.sign-out', async (work) => {
    const rows = await work.sql<{ account_id: string }>(
      'update app_session set ended_at = ? where token_hash = ? and ended_at is null returning account_id',
      [work.now, tokenHash(token)],
    );
    for (const row of rows) await work.event('sign-out', row.account_id, {});
  });
}
