import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';
import { confirmPassword } from './confirm-password';
import { systemActor, type Actor } from './roles';
import { liveRow, liveSession } from './session';

/**
 * The clinic's tablet goes into the participant's hands: until it is taken back with the password of who signed in,
 * this session reads and signs one consent and reaches nothing else.
 */
export async function handOver(token: string, { screeningId, siteId }: { screeningId: string; siteId: string }): Promise<void> {
  await withWork(systemActor(), 'session.hand-over', async (work) => {
    const row = await liveRow(work, token);
    if (!row) throw new Refusal('unauthenticated', 'Sign in first.');
    await work.sql('update app_session set handed_over_screening_id = ?, handed_over_site_id = ? where id = ?', [screeningId, siteId, row.id]);
    await work.event('tablet', row.account_id, { handedOver: screeningId }, { siteId });
  });
}

/** The tablet comes back. @throws Refusal 'invalid' when the password is not that of the one who signed in. */
export async function takeBack(token: string, password: string): Promise<{ screeningId: string | null }> {
  const session = await liveSession(token);
  if (!session) throw new Refusal('unauthenticated', 'The session has ended. Sign in again.');
  const screeningId = session.actor.screeningId;
  const signedIn = await withWork(systemActor(), 'session.hand-over', (work) => liveRow(work, token));
  if (!signedIn) throw new Refusal('unauthenticated', 'The session has ended. Sign in again.');
  const owner: Actor = { ...session.actor, accountId: signedIn.account_id };
  await confirmPassword(owner, password);
  await withWork(systemActor(), 'session.hand-over', async (work) => {
    await work.sql('update app_session set handed_over_screening_id = null, handed_over_site_id = null where id = ?', [signedIn.id]);
    await work.event('tablet', signedIn.account_id, { takenBack: screeningId });
  });
  return { screeningId };
}
