import { liveSession } from '@/lib/auth/session';
import { openSession } from '@/lib/auth/sign-in';
import type { Actor } from '@/lib/auth/roles';
import { demoAccounts } from '../demo-accounts.mjs';
import { connect } from './statements';

/** The actor behind a demonstration account, as a request of that account would find it. */
export async function actorOf(key: string): Promise<Actor> {
  const email = demoAccounts.find((account) => account.key === key)?.email;
  const owner = await connect('OWNER_DATABASE_URL');
  const { rows } = await owner.query<{ account_id: string }>('select account_id from credential where email = $1', [email]);
  await owner.end();
  const session = rows[0] ? await liveSession(await openSession(rows[0].account_id)) : null;
  if (!session) throw new Error(`The data base has no account '${key}': seed it with scripts/seed.ts.`);
  return session.actor;
}
