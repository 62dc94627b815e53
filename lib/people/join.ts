import { findUsableLink, type UsableLink } from '@/lib/auth/invitee';
import { hashPassword } from '@/lib/auth/password';
import { systemActor } from '@/lib/auth/roles';
import { mayTry } from '@/lib/auth/throttle';
import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';
import type { Work } from '@/lib/work/work';
import type { JoinInput } from './input';

const gone = () => new Refusal('expired', 'This link is no longer valid. Ask your site to send you a new one.');
const tooMany = () => new Refusal('too-many', 'Too many links were tried from here. Wait 15 minutes, then open the link in your letter again.');

/** Where the request came from, as far as it can be known. */
interface From {
  readonly from: string;
  readonly now?: Date;
}

const leadsToAccount = (link: UsableLink | null): link is UsableLink & { accountId: string } =>
  link !== null && link.kind !== 'consent' && link.accountId !== null;

/** The link behind a token. A miss counts against whoever guesses, and is kept although the request is refused. */
async function findLink(token: string, { from, now }: From): Promise<UsableLink & { accountId: string }> {
  const found = await withWork(
    systemActor(),
    'account.join',
    async (work) => {
      const link = await findUsableLink(work, token);
      if (leadsToAccount(link)) return link;
      return (await mayTry(work, { bucket: `link from ${from}`, most: 20, withinSeconds: 900 })) ? 'gone' : 'too-many';
    },
    now ? { now } : {},
  );
  if (found === 'too-many') throw tooMany();
  if (found === 'gone') throw gone();
  return found;
}

/** What the page of a link says before a password is chosen. Looking uses nothing up: mail scanners look too. */
export async function viewJoin(token: string, from: From): Promise<{ siteName: string | null }> {
  const link = await findLink(token, from);
  if (link.siteId === null) return { siteName: null };
  return withWork(systemActor(), 'invitation.view', async (work) => {
    const [site] = await work.sql<{ name: string }>('select name from site where id = ?', [link.siteId]);
    return { siteName: site?.name ?? null };
  });
}

/** The address that the person signs in with: the one the letter went to. */
async function giveCredential(work: Work, link: UsableLink & { accountId: string }, passwordHash: string): Promise<string> {
  const [standing] = await work.sql<{ email: string }>('update credential set password_hash = ?, changed_at = ?, version = version + 1 where account_id = ? returning email', [
    passwordHash,
    work.now,
    link.accountId,
  ]);
  if (standing) return standing.email;
  const [identity] = await work.sql<{ email: string | null }>('select email from participant_identity where participant_id = ?', [link.participantId]);
  if (!identity?.email) throw gone();
  const email = identity.email.toLowerCase();
  const taken = await work.sql('select account_id from credential where email = ?', [email]);
  if (taken.length > 0) throw new Refusal('conflict', 'Your e-mail address already signs in somebody else here. Ask your site to change the address it holds for you.');
  await work.sql('insert into credential (account_id, email, password_hash, changed_at) values (?, ?, ?, ?)', [link.accountId, email, passwordHash, work.now]);
  return email;
}

/**
 * Takes up an invitation: sets the password, uses the link up, opens the account. Whoever holds the token proves who they are by it.
 * @returns the address to sign in with.
 * @throws Refusal 'expired' for an unknown, used or expired link (which of them is not said); 'too-many' when guessed at.
 */
export async function join({ token, password }: JoinInput, from: From): Promise<{ email: string }> {
  const link = await findLink(token, from);
  const passwordHash = await hashPassword(password);
  return withWork(
    systemActor(),
    'account.join',
    async (work) => {
      // Of two that hold the same link, the first to get here uses it.
      const used = await work.sql('update invitation set used_at = ?, version = version + 1 where id = ? and used_at is null and expires_at > ? returning id', [work.now, link.id, work.now]);
      if (used.length === 0) throw gone();
      const email = await giveCredential(work, link, passwordHash);
      await work.sql(`update account set state = 'active', version = version + 1 where id = ? and state = 'invited'`, [link.accountId]);
      await work.event('account', link.accountId, { what: 'joined' });
      return { email };
    },
    from.now ? { now: from.now } : {},
  );
}
