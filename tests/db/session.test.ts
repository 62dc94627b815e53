import { expect, test } from 'vitest';
import { authOptions } from '@/lib/auth/auth-options';
import { handOver } from '@/lib/auth/hand-over';
import { chooseRole, liveSession } from '@/lib/auth/session';
import { openSession } from '@/lib/auth/sign-in';
import { asOwner, givenScene, givenScreening } from '../given';

/** A second role for somebody, at the same site. */
async function givenRole(accountId: string, siteId: string, studyId: string): Promise<string> {
  const [grant] = await asOwner<{ id: string }>(
    `insert into role_grant (account_id, study_id, role, label, site_ids, starts_at) values ($1, $2, 'assessor', 'T-90', array[$3::uuid], '2026-01-01') returning id`,
    [accountId, studyId, siteId],
  );
  return grant?.id ?? '';
}

test('signing in anew in one browser ends the session before it, and no other', async () => {
  const { coordinator } = await givenScene();
  const [before, elsewhere] = [await openSession(coordinator.accountId), await openSession(coordinator.accountId)];
  const signIn = { token: {}, user: { id: coordinator.accountId }, account: null, trigger: 'signIn' } as const;
  const made = await authOptions(before).callbacks?.jwt?.(signIn);
  expect(await liveSession(before)).toBeNull();
  expect(await liveSession(elsewhere)).not.toBeNull();
  expect(await liveSession(made?.sid ?? '')).not.toBeNull();
});

test('no role is taken up while the tablet is handed over', async () => {
  const { coordinator, site, protocol, study } = await givenScene();
  const grantId = await givenRole(coordinator.accountId, site.id, study.id);
  const screening = await givenScreening(site, protocol);
  const token = await openSession(coordinator.accountId);
  await handOver(token, { screeningId: screening.id, siteId: site.id });
  await expect(chooseRole(token, grantId)).rejects.toMatchObject({ code: 'forbidden' });
  expect((await liveSession(token))?.actor.role).toBe('invitee');
});

test('a chosen role that has ended ends the session, and no other role is taken up in its place', async () => {
  const { coordinator, site, study } = await givenScene();
  const grantId = await givenRole(coordinator.accountId, site.id, study.id);
  const token = await openSession(coordinator.accountId);
  await chooseRole(token, grantId);
  expect((await liveSession(token))?.actor).toMatchObject({ role: 'assessor', label: 'T-90' });
  await asOwner(`update role_grant set ends_at = now() - interval '1 second' where id = $1`, [grantId]);
  expect(await liveSession(token)).toBeNull();
});
