import { expect, test } from 'vitest';
import { hashPassword } from '@/lib/auth/password';
import { handOver, takeBack } from '@/lib/auth/hand-over';
import { may } from '@/lib/auth/policy';
import { liveSession } from '@/lib/auth/session';
import { openSession } from '@/lib/auth/sign-in';
import { viewScreening } from '@/lib/enrolment/view-screening';
import { signConsent } from '@/lib/consent/sign-consent';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenConsent, givenScene, givenScreening } from '../given';

test('a tablet in the participant’s hands reaches one consent and nothing else, until its owner takes it back', async () => {
  const { site, protocol, coordinator } = await givenScene();
  await asOwner(`insert into credential (account_id, email, password_hash) values ($1, 'tablet@tidemark.example', $2)`, [coordinator.accountId, await hashPassword('slack-water-lantern-9')], 'sign-in');
  const screening = await givenScreening(site, protocol, { confirmedBy: coordinator });
  const other = await givenScreening(site, protocol, { confirmedBy: coordinator });
  const consent = await givenConsent(screening, protocol, coordinator, 'reading');
  const token = await openSession(coordinator.accountId);
  expect((await liveSession(token))?.actor.role).toBe('site-coordinator');

  await handOver(token, { screeningId: screening.id, siteId: site.id });
  const held = (await liveSession(token))?.actor;
  if (!held) throw new Error('The session lives on.');
  expect([held.role, held.screeningId, may(held.role, 'participant.list'), may(held.role, 'consent.countersign')]).toEqual(['invitee', screening.id, false, false]);
  await expect(withWork(held, 'screening.view', (work) => viewScreening(work, { id: other.id }))).rejects.toMatchObject({ code: 'forbidden' });
  // The part must be read first: the refusal is about the form, not about reach.
  const sign = { id: consent.id, statements: [], permissions: {}, signature: { kind: 'typed' as const, name: 'Ada Example' } };
  await expect(withWork(held, 'consent.sign', (work) => signConsent(work, sign))).rejects.toMatchObject({ code: 'invalid' });

  await expect(takeBack(token, 'not the password')).rejects.toMatchObject({ field: 'password' });
  expect((await liveSession(token))?.actor.role).toBe('invitee');
  await takeBack(token, 'slack-water-lantern-9');
  expect((await liveSession(token))?.actor.role).toBe('site-coordinator');
});
