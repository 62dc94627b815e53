import { expect, test } from 'vitest';
import { hashPassword } from '@/lib/auth/password';
import { handOver, takeBack } from '@/lib/auth/hand-over';
import { handOverForConsent } from '@/lib/consent/hand-over-for-consent';
import { may } from '@/lib/auth/policy';
import { liveSession } from '@/lib/auth/session';
import { openSession } from '@/lib/auth/sign-in';
import { viewScreening } from '@/lib/enrolment/view-screening';
import { signConsent } from '@/lib/consent/sign-consent';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenConsent, givenParticipant, givenScene, givenScreening, givenStaff } from '../given';

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

test('only who takes consent at the site hands the tablet over, and only for a consent that is read on it', async () => {
  const scene = await givenScene();
  const { site, protocol, coordinator, otherCoordinator } = scene;
  const participant = await givenParticipant(site, protocol, coordinator);
  const open = await givenScreening(site, protocol, { confirmedBy: coordinator });
  await givenConsent(open, protocol, coordinator, 'reading');
  const token = await openSession(coordinator.accountId);
  await expect(handOverForConsent(participant.actor, token, participant.screeningId)).rejects.toMatchObject({ code: 'forbidden' });
  await expect(handOverForConsent(await givenStaff('assessor', site), token, open.id)).rejects.toMatchObject({ code: 'forbidden' });
  await expect(handOverForConsent(otherCoordinator, token, open.id)).rejects.toMatchObject({ code: 'not-found' });
  await expect(handOverForConsent(coordinator, token, participant.screeningId)).rejects.toMatchObject({ code: 'conflict' });
  await expect(handOverForConsent(coordinator, token, open.id)).resolves.toEqual({ handedOver: true });
});
