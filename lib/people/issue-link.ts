import { newToken, tokenHash } from '@/lib/auth/token';
import { secondsAfter } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** Links for participants work this long. */
export const linkDays = 14;

/** Whom a link is for. */
export type LinkFor =
  | { readonly kind: 'consent'; readonly siteId: string; readonly screeningId: string }
  | { readonly kind: 'join'; readonly siteId: string; readonly participantId: string; readonly accountId: string };

/**
 * Makes a single-use link and ends those made before it for the same person and purpose.
 * Called by the job that mails it, so that the token stands in the letter and nowhere else; the data base keeps its hash.
 * @returns the token.
 */
export async function issueLink(work: Work, link: LinkFor): Promise<string> {
  const token = newToken();
  const [column, id] = link.kind === 'consent' ? ['screening_id', link.screeningId] : ['participant_id', link.participantId];
  await work.sql(`update invitation set used_at = ?, version = version + 1 where kind = ? and ${column} = ? and used_at is null`, [work.now, link.kind, id]);
  await work.sql('insert into invitation (token_hash, kind, site_id, screening_id, participant_id, account_id, created_at, expires_at) values (?, ?, ?, ?, ?, ?, ?, ?)', [
    tokenHash(token),
    link.kind,
    link.siteId,
    link.kind === 'consent' ? link.screeningId : null,
    link.kind === 'join' ? link.participantId : null,
    link.kind === 'join' ? link.accountId : null,
    work.now,
    secondsAfter(work.now, linkDays * 86_400),
  ]);
  return token;
}
