import type { Actor } from './roles';
import { inviteeAccountId, nobody, systemActor } from './roles';
import { mayTry } from './throttle';
import { tokenHash } from './token';
import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';
import type { Work } from '@/lib/work/work';

/** A link as its holder presents it. */
export interface PresentedLink {
  readonly token: string;
  readonly from: string;
}

export interface UsableLink {
  readonly id: string;
  readonly kind: 'consent' | 'join' | 'staff' | 'password';
  readonly siteId: string | null;
  readonly screeningId: string | null;
  readonly participantId: string | null;
  readonly accountId: string | null;
}

/** The link behind a token, if it may still be used. Inside an act that opens the sign-in door. */
export async function findUsableLink(work: Work, token: string): Promise<UsableLink | null> {
  const [row] = await work.sql<UsableLink>(
    `select id, kind, site_id as "siteId", screening_id as "screeningId", participant_id as "participantId", account_id as "accountId"
     from invitation where token_hash = ? and used_at is null and expires_at > ?`,
    [tokenHash(token), work.now],
  );
  return row ?? null;
}

/**
 * The holder of a consent link, as an actor who reaches one screening and nothing else.
 * @throws Refusal 'expired' for an unknown, used or expired link (which of them is not said); 'too-many' when guessed at.
 */
export async function inviteeOf({ token, from }: PresentedLink): Promise<Actor> {
  const found = await withWork(systemActor(), 'session.check', async (work) => {
    const link = await findUsableLink(work, token);
    if (link) return link;
    return (await mayTry(work, { bucket: `link from ${from}`, most: 20, withinSeconds: 900 })) ? null : 'too-many';
  });
  if (found === 'too-many') throw new Refusal('too-many', 'Too many links were tried from here. Wait 15 minutes, then open the link in your letter again.');
  if (found?.kind !== 'consent' || !found.siteId || !found.screeningId)
    throw new Refusal('expired', 'This link is no longer valid. Ask your site to send you a new one.');
  return {
    accountId: inviteeAccountId,
    role: 'invitee',
    label: 'invited person',
    studyId: null,
    reach: [found.siteId],
    participantId: nobody,
    screeningId: found.screeningId,
  };
}
