import { buffer } from 'node:stream/consumers';
import { beforeAll, expect, test, vi } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { countersignConsent } from '@/lib/consent/countersign-consent';
import { receivePaperForm } from '@/lib/consent/receive-paper-form';
import { recordPaperSignature } from '@/lib/consent/record-paper-signature';
import { startConsent } from '@/lib/consent/start-consent';
import { consentCopy } from '@/lib/jobs/handlers/consent-copy';
import type { Posting } from '@/lib/mail/send-letter';
import { storage } from '@/lib/storage';
import { withWork } from '@/lib/work/with-work';
import { onePagePdf, onePixelPng } from '../forms';
import { asOwner, givenScene, givenScreening, givenStaff, jobDeps, staffName, type GivenScene } from '../given';

// Who is signed in is the edge that a test may replace; the route, the policy and the data base are the real ones.
let signedIn: Actor | null = null;
vi.mock('@/lib/web/session', () => ({ currentSession: () => Promise.resolve(signedIn ? { actor: signedIn } : null) }));
const { POST: upload } = await import('@/app/api/consents/[id]/paper/route');
const { GET: download } = await import('@/app/api/consents/[id]/file/[which]/route');

let scene: GivenScene;
beforeAll(async () => {
  scene = await givenScene();
});

async function startPaper() {
  const screening = await givenScreening(scene.site, scene.protocol);
  const { id } = await withWork(scene.coordinator, 'consent.start', (work) => startConsent(work, { id: screening.id, mode: 'paper' }));
  return { id, screening };
}

const address = 'http://127.0.0.1:3000';
const send = (id: string, body: BodyInit, headers: Record<string, string> = {}) =>
  upload(new Request(`${address}/api/consents/${id}/paper`, { method: 'POST', body, headers: { origin: address, ...headers }, ...(body instanceof ReadableStream ? { duplex: 'half' } : {}) } as RequestInit), {
    params: Promise.resolve({ id }),
  });
const fetchFile = (id: string, which: 'copy' | 'form') => download(new Request(`${address}/api/consents/${id}/file/${which}`), { params: Promise.resolve({ id, which }) });

const record = (actor: Actor, id: string, change: { signedOn?: string } = {}) =>
  withWork(actor, 'consent.upload', (work) =>
    recordPaperSignature(work, { id, signedOn: '2026-06-01', statements: ['read', 'free'], permissions: { 'data-sharing': 'no', 'future-contact': 'no' }, ...change }),
  );

test('a paper form is received, recorded, signed second, and served back to its own site only, to be saved', async () => {
  const { id } = await startPaper();
  signedIn = scene.coordinator;
  const received = await send(id, onePixelPng, { 'content-type': 'application/pdf' });
  expect(received.status).toBe(201);
  // What the browser said of it did not count.
  expect(await received.json()).toMatchObject({ contentType: 'image/png', byteCount: onePixelPng.length });
  expect(await record(scene.coordinator, id)).toMatchObject({ state: 'signed by participant' });
  expect(await withWork(scene.coordinator, 'consent.countersign', (work) => countersignConsent(work, { id, name: staffName(scene.coordinator) }))).toMatchObject({ state: 'complete' });

  const served = await fetchFile(id, 'form');
  expect(served.status).toBe(200);
  expect(served.headers.get('content-disposition')).toBe('attachment; filename="consent-form.png"');
  expect(served.headers.get('x-content-type-options')).toBe('nosniff');
  expect(served.headers.get('content-security-policy')).toContain('sandbox');
  expect(Buffer.from(await served.arrayBuffer())).toEqual(onePixelPng);

  signedIn = scene.otherCoordinator;
  expect((await fetchFile(id, 'form')).status).toBe(404);
  signedIn = await givenStaff('monitor', scene.site);
  expect((await fetchFile(id, 'form')).status).toBe(403);
  signedIn = null;
  expect((await fetchFile(id, 'form')).status).toBe(401);
});

test('the copy of a paper form is the form itself', async () => {
  const { id, screening } = await startPaper();
  await receivePaperForm(scene.coordinator, { id }, onePagePdf);
  await record(scene.coordinator, id);
  await withWork(scene.coordinator, 'consent.countersign', (work) => countersignConsent(work, { id, name: staffName(scene.coordinator) }));
  const sent: Posting[] = [];
  await consentCopy.run({ siteId: scene.site.id, consentId: id }, jobDeps((_letter, posting) => Promise.resolve(void sent.push(posting))));
  expect(sent).toMatchObject([{ to: screening.email, attachments: [{ filename: 'your-copy.pdf', contentType: 'application/pdf' }] }]);
  expect(sent[0]?.attachments?.[0]?.content).toEqual(onePagePdf);
});

test('what is no form is refused by name, and nothing of it is kept', async () => {
  const { id } = await startPaper();
  signedIn = scene.coordinator;
  const answer = await send(id, Buffer.from('MZ\x90\x00 not a form', 'latin1'), { 'content-type': 'application/pdf' });
  expect(answer.status).toBe(422);
  expect(await answer.json()).toMatchObject({ detail: 'This is a Windows program. Send a PDF, or a photograph of the form as JPEG or PNG.', fields: [{ field: 'file' }] });
  expect(await asOwner('select id from stored_file where screening_id = (select screening_id from consent where id = $1)', [id])).toEqual([]);
});

test('a body that goes on past 10 MB is stopped while it arrives, whatever it said of its length', async () => {
  const { id } = await startPaper();
  signedIn = scene.coordinator;
  let pulled = 0;
  const endless = new ReadableStream({
    pull(controller) {
      pulled += 1;
      controller.enqueue(new Uint8Array(1_000_000));
    },
  });
  const answer = await send(id, endless);
  expect(answer.status).toBe(413);
  expect(((await answer.json()) as { detail: string }).detail).toContain('larger than 10 MB');
  expect(pulled).toBeLessThan(20);
});

test('another site, a monitor, a foreign page and nobody send nothing', async () => {
  const { id } = await startPaper();
  signedIn = scene.otherCoordinator;
  expect((await send(id, onePagePdf)).status).toBe(404);
  signedIn = await givenStaff('monitor', scene.site);
  expect((await send(id, onePagePdf)).status).toBe(403);
  signedIn = null;
  expect((await send(id, onePagePdf)).status).toBe(401);
  signedIn = scene.coordinator;
  expect((await send(id, onePagePdf, { origin: 'https://elsewhere.example' })).status).toBe(403);
});

test('no form, a day to come or before the form was in effect, or a signature already recorded is refused', async () => {
  const { id } = await startPaper();
  await expect(record(scene.coordinator, id)).rejects.toMatchObject({ code: 'conflict', field: 'file' });
  await receivePaperForm(scene.coordinator, { id }, onePagePdf);
  await expect(record(scene.coordinator, id, { signedOn: '2999-01-01' })).rejects.toMatchObject({ code: 'invalid', field: 'signedOn' });
  // The form of the scene is in effect from 1 Jan 2026.
  for (const signedOn of ['1999-01-01', '2025-12-31'])
    await expect(record(scene.coordinator, id, { signedOn })).rejects.toMatchObject({ code: 'invalid', field: 'signedOn', message: expect.stringContaining('in effect from 1 Jan 2026') as string });
  await record(scene.coordinator, id);
  await expect(receivePaperForm(scene.coordinator, { id }, onePagePdf)).rejects.toMatchObject({ code: 'conflict' });
});

test('a form that could not be joined to its consent does not stay in the file store', async () => {
  const { id } = await startPaper();
  const put = vi.spyOn(storage(), 'put').mockImplementationOnce(async (key, body, about) => {
    const content = Buffer.isBuffer(body) ? body : await buffer(body);
    const head = await storage().put(key, content, about);
    // Somebody else records the consent in another way between the two transactions.
    await asOwner(`update consent set mode = 'tablet' where id = $1`, [id]);
    return head;
  });
  await expect(receivePaperForm(scene.coordinator, { id }, onePagePdf)).rejects.toMatchObject({ code: 'conflict' });
  const key = put.mock.calls[0]?.[0] ?? '';
  expect(key).toMatch(/^consent\//);
  expect(await storage().head(key)).toBeNull();
});
