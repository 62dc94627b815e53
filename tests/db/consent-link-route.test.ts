import { beforeAll, expect, test, vi } from 'vitest';
import { consentLink } from '@/lib/jobs/handlers/consent-link';
import { openConsentLink } from '@/lib/consent/open-link';
import { startConsent } from '@/lib/consent/start-consent';
import type { Posting } from '@/lib/mail/send-letter';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenScene, givenScreening, jobDeps, type GivenScene } from '../given';

vi.mock('@/lib/web/session', () => ({ currentSession: () => Promise.resolve(null) }));
const { POST: readPart } = await import('@/app/api/consents/[id]/parts/route');
const { POST: sign } = await import('@/app/api/consents/[id]/sign/route');
const { POST: countersign } = await import('@/app/api/consents/[id]/countersign/route');

const address = 'http://127.0.0.1:3000';
let scene: GivenScene;
let id: string;
let token: string;

beforeAll(async () => {
  scene = await givenScene();
  const screening = await givenScreening(scene.site, scene.protocol);
  ({ id } = await withWork(scene.coordinator, 'consent.start', (work) => startConsent(work, { id: screening.id, mode: 'home' })));
  const sent: Posting[] = [];
  await consentLink.run({ siteId: scene.site.id, screeningId: screening.id }, jobDeps((_letter, posting) => Promise.resolve(void sent.push(posting))));
  token = (sent[0]?.data as { url: string }).url.split('/').at(-1) ?? '';
});

const call = (handler: typeof readPart, body: object, headers: Record<string, string> = { 'invitation-token': token }) =>
  handler(new Request(`${address}/api/consents/${id}/x`, { method: 'POST', body: JSON.stringify(body), headers: { origin: address, 'idempotency-key': 'sign-at-home-0123456789', ...headers } }), { params: Promise.resolve({ id }) });

test('whoever holds the letter reads, stops, goes on where it stopped, and signs once; nobody else does', async () => {
  expect((await call(readPart, { part: 'key-facts' }, {})).status).toBe(401);
  expect((await call(readPart, { part: 'key-facts' }, { 'invitation-token': 'guessed' })).status).toBe(410);
  expect((await call(readPart, { part: 'key-facts' }, { 'invitation-token': token, origin: 'https://elsewhere.example' })).status).toBe(403);
  expect((await call(readPart, { part: 'no-such-part' })).status).toBe(404);
  expect((await call(readPart, { part: 'key-facts' })).status).toBe(200);
  expect((await call(readPart, { part: 'key-facts' })).status).toBe(200);
  expect(await openConsentLink({ token, from: 'another device' })).toMatchObject({ sectionsRead: ['key-facts'] });
  expect((await call(readPart, { part: 'what-we-ask' })).status).toBe(200);
  const agreement = { statements: ['read', 'free'], permissions: { 'data-sharing': 'no', 'future-contact': 'no' } };
  const unsigned = await call(sign, agreement);
  expect(await unsigned.json()).toMatchObject({ status: 422, fields: [{ field: 'signature', sentence: 'Sign with a finger, or type your name.' }] });
  const signature = { kind: 'typed', name: 'Ada Example' };
  const signed = await Promise.all([call(sign, { ...agreement, signature }), call(sign, { ...agreement, signature })]);
  expect(signed.map(({ status }) => status)).toContain(201);
  expect(await asOwner('select who, means from consent_signature where consent_id = $1', [id])).toEqual([{ who: 'participant', means: 'typed' }]);
  expect((await call(readPart, { part: 'key-facts' })).status).toBe(410);
  await expect(openConsentLink({ token, from: 'home' })).rejects.toMatchObject({ code: 'expired' });
  // A link has no role that signs second: without a session it is nobody.
  expect((await call(countersign, { agreed: true, name: 'Ada Example' }, { 'invitation-token': token, 'if-match': '"v1"' })).status).toBe(401);
});
