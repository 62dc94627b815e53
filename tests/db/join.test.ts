import { beforeAll, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { liveSession } from '@/lib/auth/session';
import { openSession, verifySignIn } from '@/lib/auth/sign-in';
import { enrolParticipant } from '@/lib/enrolment/enrol-participant';
import { enrolInput } from '@/lib/enrolment/input';
import { inviteParticipant } from '@/lib/enrolment/invite-participant';
import { viewMyConsent } from '@/lib/consent/view-consent';
import { participantInvite } from '@/lib/jobs/handlers/participant-invite';
import type { Posting } from '@/lib/mail/send-letter';
import { joinInput } from '@/lib/people/input';
import { join, viewJoin } from '@/lib/people/join';
import { secondsAfter } from '@/lib/work/time';
import { withWork } from '@/lib/work/with-work';
import type { Work } from '@/lib/work/work';
import { asOwner, givenConsent, givenScene, givenScreening, jobDeps, type GivenScene } from '../given';

let scene: GivenScene;
beforeAll(async () => {
  scene = await givenScene();
});

const password = 'seven quiet harbours';
const facts = {
  affectedSide: 'right', dominantSide: 'right', surgeryOn: '2026-01-15', surgery: 'breast-conserving', axillaryProcedure: 'sentinel-node-biopsy',
  nodesRemoved: 2, radiotherapy: 'breast-or-chest-wall', systemicTherapy: 'endocrine', heightCm: 170,
};

async function enrolled(email?: string) {
  const screening = await givenScreening(scene.site, scene.protocol, { confirmedBy: scene.coordinator, ...(email ? { email } : {}) });
  await givenConsent(screening, scene.protocol, scene.coordinator);
  const { participantId, code } = await withWork(scene.coordinator, 'participant.enrol', (work) => enrolParticipant(work, enrolInput.parse({ ...facts, id: screening.id })));
  return { screening, participantId, code };
}

/** Runs the job of the invitation, and returns the token in the letter, or null when none was sent. */
async function invitedToken(participantId: string, now?: Date): Promise<string | null> {
  const sent: Posting[] = [];
  await participantInvite.run({ siteId: scene.site.id, participantId }, jobDeps((_letter, posting) => Promise.resolve(void sent.push(posting)), now));
  const url = (sent[0]?.data as { url: string } | undefined)?.url;
  return url?.split('/').at(-1) ?? null;
}

const from = { from: 'a home' };

test('an invited participant chooses a password, signs in with the own address, and reaches the own record alone', async () => {
  const { screening, participantId, code } = await enrolled();
  const token = (await invitedToken(participantId)) ?? '';
  expect(await viewJoin(token, from)).toEqual({ siteName: scene.site.name });
  expect(await join({ token, password }, from)).toEqual({ email: screening.email });
  const account = await verifySignIn({ email: screening.email, password, from: 'a home' });
  expect(account).toMatch(/^[0-9a-f-]{36}$/);
  const live = await liveSession(await openSession(account as string));
  expect(live?.actor).toMatchObject({ role: 'participant', label: code, participantId, reach: [scene.site.id] });
  const mine = await withWork(live?.actor as Actor, 'consent.view', viewMyConsent);
  expect(mine).toMatchObject({ state: 'complete', formNumber: '1.0', permissions: { 'data-sharing': 'yes', 'future-contact': 'no' } });
});

test('the link works once', async () => {
  const { participantId } = await enrolled();
  const token = (await invitedToken(participantId)) ?? '';
  await join({ token, password }, from);
  await expect(join({ token, password: 'another long password' }, from)).rejects.toMatchObject({ code: 'expired', message: 'This link is no longer valid. Ask your site to send you a new one.' });
});

test('of two who use one link at one moment, one gets in', async () => {
  const { participantId } = await enrolled();
  const token = (await invitedToken(participantId)) ?? '';
  const answers = await Promise.allSettled([join({ token, password }, from), join({ token, password }, from)]);
  expect(answers.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
});

test('the link runs out after 14 days', async () => {
  const { participantId } = await enrolled();
  const day = 86_400;
  const token = (await invitedToken(participantId, secondsAfter(new Date(), -14 * day - 60))) ?? '';
  await expect(join({ token, password }, from)).rejects.toMatchObject({ code: 'expired' });
});

test('an invitation sent again ends the one before, and none is sent to somebody who has joined', async () => {
  const { participantId } = await enrolled();
  const first = (await invitedToken(participantId)) ?? '';
  await withWork(scene.coordinator, 'participant.invite', (work) => inviteParticipant(work, { participantId }));
  const second = (await invitedToken(participantId)) ?? '';
  await expect(join({ token: first, password }, from)).rejects.toMatchObject({ code: 'expired' });
  await join({ token: second, password }, from);
  await expect(withWork(scene.coordinator, 'participant.invite', (work) => inviteParticipant(work, { participantId }))).rejects.toMatchObject({ code: 'conflict' });
  expect(await invitedToken(participantId)).toBeNull();
  await expect(withWork(scene.otherCoordinator, 'participant.invite', (work) => inviteParticipant(work, { participantId }))).rejects.toMatchObject({ code: 'not-found' });
});

test('an address that signs in somebody else already is not taken over', async () => {
  const one = await enrolled('shared@home.example');
  await join({ token: (await invitedToken(one.participantId)) ?? '', password }, from);
  const two = await enrolled('shared@home.example');
  const token = (await invitedToken(two.participantId)) ?? '';
  await expect(join({ token, password }, from)).rejects.toMatchObject({ code: 'conflict' });
  // The refusal used nothing up: once the site has changed the address, the same letter works.
  const correct = (work: Work) => work.sql(`update participant_identity set email = 'own@home.example' where participant_id = ?`, [two.participantId]);
  await withWork(scene.coordinator, 'identity.correct', correct, { reason: 'Shared with another person.' });
  expect(await join({ token, password }, from)).toEqual({ email: 'own@home.example' });
});

test('guessing is throttled, and misses count although they are refused', async () => {
  const guess = () => join({ token: 'guess-guess-guess-guess-guess', password }, { from: 'a guesser' }).catch((error: { code: string }) => error.code);
  const answers: unknown[] = [];
  for (let tries = 0; tries < 21; tries += 1) answers.push(await guess());
  expect(answers.filter((code) => code === 'expired')).toHaveLength(20);
  expect(answers.at(-1)).toBe('too-many');
});

test('a consent link opens no account', async () => {
  const screening = await givenScreening(scene.site, scene.protocol);
  const { newToken, tokenHash } = await import('@/lib/auth/token');
  const token = newToken();
  await asOwner(`insert into invitation (token_hash, kind, site_id, screening_id, created_at, expires_at) values ($1, 'consent', $2, $3, now(), now() + interval '14 days')`, [tokenHash(token), scene.site.id, screening.id], 'sign-in');
  await expect(join({ token, password }, from)).rejects.toMatchObject({ code: 'expired' });
});

test.each(['short', 'passwordpassword', 'aaaaaaaaaaaaaaaa'])('the password %s is refused before anything is used up', (weak) => {
  expect(joinInput.safeParse({ token: 'x'.repeat(43), password: weak }).success).toBe(false);
});

test('job rows hold ids alone', async () => {
  const rows = await withWork(scene.coordinator, 'screening.list', (work) => work.sql<{ data: object }>(`select data from pgboss.job where name in ('participant.invite', 'consent.link', 'consent.copy')`));
  expect(rows.length).toBeGreaterThan(0);
  expect(JSON.stringify(rows)).not.toMatch(/@|Ada|token/);
});
