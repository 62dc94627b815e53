import { systemActor } from './roles';
import { isPassword } from './password';
import { unknownSource } from './source';
import { clearTries, mayTry, takeBackTry } from './throttle';
import { newToken, tokenHash } from './token';
import { withWork } from '@/lib/work/with-work';
import { secondsAfter } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** Sessions end after 12 hours whatever happens; idle ones sooner (see idleSeconds). */
export const sessionSeconds = 12 * 3600;

export interface SignInTry {
  readonly email: string;
  readonly password: string;
  /** Where the request came from, as far as it can be known. */
  readonly from: string;
}

/**
 * Wrong tries that are let through in a quarter of an hour. Where the source is known, it meets a narrow limit on one
 * address and a wide one on all of them; the address by itself has a limit that one stranger cannot use up. Where nobody
 * vouches for the source, everybody shares it: a limit on it would let one guesser shut everybody out, so only the
 * address's own counts. Common practice; NIST SP 800-63B asks for no more than 100 wrong tries on one account.
 */
const within = { withinSeconds: 900 } as const;
const limits = { addressFromSource: 10, address: 30, source: 60 } as const;

const bucketsOf = (address: string, from: string) => ({ pair: `sign-in ${address} from ${from}`, address: `sign-in ${address}`, source: `sign-in from ${from}` });

/** Counts a try in every bucket that it falls into. */
async function countTry(work: Work, address: string, from: string): Promise<boolean> {
  const buckets = bucketsOf(address, from);
  if (from !== unknownSource && !(await mayTry(work, { bucket: buckets.pair, most: limits.addressFromSource, ...within }))) return false;
  if (!(await mayTry(work, { bucket: buckets.address, most: limits.address, ...within }))) return false;
  return from === unknownSource || mayTry(work, { bucket: buckets.source, most: limits.source, ...within });
}

/** A right password is no try at guessing; what others tried on the address stays counted. */
async function forgetTry(work: Work, address: string, from: string): Promise<void> {
  const buckets = bucketsOf(address, from);
  if (from === unknownSource) return clearTries(work, buckets.address);
  await clearTries(work, buckets.pair);
  await takeBackTry(work, buckets.address);
  await takeBackTry(work, buckets.source);
}

/**
 * Checks an address and a password.
 * @returns the account id; 'too-many' when tried too often; null when they do not match (which of the two is not said).
 */
export async function verifySignIn({ email, password, from }: SignInTry): Promise<string | 'too-many' | null> {
  const address = email.trim().toLowerCase();
  const fits = await withWork(systemActor(), 'account.sign-in', async (work) => {
    const counted = await countTry(work, address, from);
    if (!counted) await work.event('sign-in', 'refused', { why: 'too many tries' });
    return counted;
  });
  if (!fits) return 'too-many';
  return withWork(systemActor(), 'account.sign-in', async (work) => {
    const [found] = await work.sql<{ account_id: string; password_hash: string | null }>(
      `select c.account_id, c.password_hash from credential c join account a on a.id = c.account_id where c.email = ? and a.state = 'active'`,
      [address],
    );
    const right = await isPassword(found?.password_hash ?? null, password);
    await work.event('sign-in', right && found ? found.account_id : 'refused', right ? {} : { why: 'address or password' });
    if (!right || !found) return null;
    await forgetTry(work, address, from);
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
