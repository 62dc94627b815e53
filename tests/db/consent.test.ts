import { beforeAll, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { inviteeOf } from '@/lib/auth/invitee';
import { countersignConsent } from '@/lib/consent/countersign-consent';
import { fetchConsentFile } from '@/lib/consent/fetch-consent-file';
import { markPartRead } from '@/lib/consent/mark-part-read';
import { recogniseForm } from '@/lib/consent/recognise-form';
import { signConsent } from '@/lib/consent/sign-consent';
import { sendConsentLink, startConsent } from '@/lib/consent/start-consent';
import { viewConsent } from '@/lib/consent/view-consent';
import { consentCopy } from '@/lib/jobs/handlers/consent-copy';
import { consentLink } from '@/lib/jobs/handlers/consent-link';
import type { Posting } from '@/lib/mail/send-letter';
import { secondsAfter } from '@/lib/work/time';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenConsent, givenScene, givenScreening, givenStaff, jobDeps, staffName, type GivenScene } from '../given';

let scene: GivenScene;
beforeAll(async () => {
  scene = await givenScene();
});

const typed = { kind: 'typed', name: 'Ada Example' } as const;
const statements = ['read', 'free'];
const permissions = { 'data-sharing': 'yes', 'future-contact': 'no' } as const;

const start = async (mode: 'tablet' | 'home' | 'paper', actor = scene.coordinator) => {
  const screening = await givenScreening(scene.site, scene.protocol);
  const consent = await withWork(actor, 'consent.start', (work) => startConsent(work, { id: screening.id, mode }));
  return { screening, id: consent.id };
};
const read = (actor: Actor, id: string, part: string) => withWork(actor, 'consent.read-part', (work) => markPartRead(work, { id, part }));
const readAll = async (actor: Actor, id: string) => {
  await read(actor, id, 'key-facts');
  await read(actor, id, 'what-we-ask');
};
const sign = (actor: Actor, id: string, change: Partial<Parameters<typeof signConsent>[1]> = {}) =>
  withWork(actor, 'consent.sign', (work) => signConsent(work, { id, statements, permissions, signature: typed, ...change }));
const countersign = (actor: Actor, id: string) => withWork(actor, 'consent.countersign', (work) => countersignConsent(work, { id, name: staffName(actor) }));

/** Runs the job that mails a link, and returns the token in the letter. */
async function mailedToken(screeningId: string, now?: Date): Promise<string> {
  const sent: Posting[] = [];
  await consentLink.run({ siteId: scene.site.id, screeningId }, jobDeps((_letter, posting) => Promise.resolve(void sent.push(posting)), now));
  const url = (sent[0]?.data as { url: string } | undefined)?.url ?? '';
  return url.split('/').at(-1) ?? '';
}

describe('on the clinic’s tablet', () => {
  test('a consent is read, signed by the participant, then by the staff, and both signatures bind to one content', async () => {
    const { id, screening } = await start('tablet');
    await readAll(screening.atTablet, id);
    expect(await sign(screening.atTablet, id)).toMatchObject({ state: 'signed by participant' });
    expect(await countersign(scene.coordinator, id)).toMatchObject({ state: 'complete' });
    const view = await withWork(scene.coordinator, 'consent.view', (work) => viewConsent(work, { id }));
    expect(view.signatures.map(({ who, name }) => [who, name])).toEqual([
      ['participant', 'Ada Example'],
      ['staff', staffName(scene.coordinator)],
    ]);
    expect(new Set(view.signatures.map(({ contentSha256 }) => contentSha256)).size).toBe(1);
  });

  test('a drawn signature carries the printed name of the record', async () => {
    const { id, screening } = await start('tablet');
    await readAll(screening.atTablet, id);
    await sign(screening.atTablet, id, { signature: { kind: 'drawn', path: 'M10.0 60.0L80.0 20.0L150.5 90.0', width: 300, height: 120 } });
    const view = await withWork(scene.coordinator, 'consent.view', (work) => viewConsent(work, { id }));
    expect(view.signatures).toMatchObject([{ means: 'drawn', name: screening.name }]);
  });

  test('an unread part stops the signature', async () => {
    const { id, screening } = await start('tablet');
    await read(screening.atTablet, id, 'key-facts');
    await expect(sign(screening.atTablet, id)).rejects.toMatchObject({ code: 'invalid', message: 'Read every part before signing: 1 still to read.' });
  });

  test('an unanswered permission, an unknown one and an unticked statement stop it too', async () => {
    const { id, screening } = await start('tablet');
    await readAll(screening.atTablet, id);
    await expect(sign(screening.atTablet, id, { permissions: { 'data-sharing': 'no' } })).rejects.toMatchObject({ code: 'invalid', message: expect.stringContaining('1 still open') as string });
    await expect(sign(screening.atTablet, id, { permissions: { ...permissions, more: 'yes' } })).rejects.toMatchObject({ code: 'invalid', field: 'permissions' });
    await expect(sign(screening.atTablet, id, { statements: ['read'] })).rejects.toMatchObject({ code: 'invalid', field: 'statements' });
  });

  test('the staff cannot sign first, and nobody signs twice', async () => {
    const { id, screening } = await start('tablet');
    await expect(countersign(scene.coordinator, id)).rejects.toMatchObject({ code: 'conflict', message: 'The participant signs first.' });
    await readAll(screening.atTablet, id);
    await sign(screening.atTablet, id);
    await expect(sign(screening.atTablet, id)).rejects.toMatchObject({ code: 'conflict', message: 'This consent is already signed.' });
    await expect(read(screening.atTablet, id, 'key-facts')).rejects.toMatchObject({ code: 'conflict' });
  });

  test('another site’s coordinator finds nothing; a monitor, an assessor and an investigator may not', async () => {
    const { id } = await start('tablet');
    await expect(countersign(scene.otherCoordinator, id)).rejects.toMatchObject({ code: 'not-found' });
    for (const role of ['monitor', 'assessor', 'investigator', 'data-manager'] as const) {
      const staff = await givenStaff(role, scene.site);
      await expect(sign(staff, id)).rejects.toMatchObject({ code: 'forbidden' });
      await expect(withWork(staff, 'consent.view', (work) => viewConsent(work, { id }))).rejects.toMatchObject({ code: 'forbidden' });
    }
  });

  test('staff read and sign nothing as the participant, by no role and in no way', async () => {
    for (const mode of ['tablet', 'home'] as const) {
      const { id } = await start(mode);
      for (const staff of [scene.coordinator, await givenStaff('site-investigator', scene.site)]) {
        await expect(read(staff, id, 'key-facts')).rejects.toMatchObject({ code: 'forbidden' });
        await expect(sign(staff, id)).rejects.toMatchObject({ code: 'forbidden' });
      }
    }
  });

  test('a tablet that was handed over for somebody else signs nothing here, and a link signs nothing that is read on the tablet', async () => {
    const { id, screening } = await start('tablet');
    const other = await start('tablet');
    await expect(sign(other.screening.atTablet, id)).rejects.toMatchObject({ code: 'not-found' });
    await readAll(screening.atTablet, id);
    await expect(sign(screening.invitee, id)).rejects.toMatchObject({ code: 'conflict' });
  });

  test('the second signature carries the name of the account that signs, and no other', async () => {
    const { id, screening } = await start('tablet');
    await readAll(screening.atTablet, id);
    await sign(screening.atTablet, id);
    const investigator = await givenStaff('site-investigator', scene.site);
    const second = (name: string) => withWork(scene.coordinator, 'consent.countersign', (work) => countersignConsent(work, { id, name }));
    for (const name of ['Ada Example', staffName(investigator), staffName(scene.coordinator).slice(0, -1)])
      await expect(second(name)).rejects.toMatchObject({ code: 'invalid', field: 'name' });
    // Capitals, spaces and accents are one hand's writing.
    await second(`  ${staffName(scene.coordinator).toUpperCase().replace('ROBIN', 'RÖBIN ')} `);
    const kept = await asOwner(`select name, account_id from consent_signature where consent_id = $1 and who = 'staff'`, [id]);
    expect(kept).toEqual([{ name: staffName(scene.coordinator), account_id: scene.coordinator.accountId }]);
  });

  test('an account without a name signs nothing', async () => {
    const { site, protocol, coordinator } = await givenScene();
    const screening = await givenScreening(site, protocol);
    const { id } = await givenConsent(screening, protocol, coordinator, 'signed by participant');
    await asOwner('update account set name = null where id = $1', [coordinator.accountId]);
    await expect(countersign(coordinator, id)).rejects.toMatchObject({ code: 'conflict', field: 'name' });
  });

  test('content that changed under the first signature is not signed a second time', async () => {
    const { id, screening } = await start('tablet');
    await readAll(screening.atTablet, id);
    await sign(screening.atTablet, id);
    await asOwner(`update consent set permissions = '{"data-sharing": "no", "future-contact": "no"}' where id = $1`, [id]);
    await expect(countersign(scene.coordinator, id)).rejects.toMatchObject({ code: 'locked' });
  });
});

describe('at home, through a link', () => {
  test('the link leads to one consent, survives being looked at, and is used up by signing', async () => {
    const { id, screening } = await start('home');
    const token = await mailedToken(screening.id);
    const invitee = await inviteeOf({ token, from: 'home' });
    expect(await inviteeOf({ token, from: 'a mail scanner' })).toEqual(invitee);
    await readAll(invitee, id);
    expect(await sign(invitee, id)).toMatchObject({ state: 'signed by participant' });
    await expect(inviteeOf({ token, from: 'home' })).rejects.toMatchObject({ code: 'expired' });
    expect(await countersign(scene.coordinator, id)).toMatchObject({ state: 'complete' });
  });

  test('the holder of another screening’s link sees and signs nothing here', async () => {
    const { id } = await start('home');
    const other = await start('home');
    const intruder = await inviteeOf({ token: await mailedToken(other.screening.id), from: 'home' });
    await expect(withWork(intruder, 'consent.view', (work) => viewConsent(work, { id }))).rejects.toMatchObject({ code: 'not-found' });
    await expect(sign(intruder, id)).rejects.toMatchObject({ code: 'not-found' });
  });

  test('a link expires after 14 days, and a new one ends the one before', async () => {
    const { id, screening } = await start('home');
    const day = 86_400;
    const old = await mailedToken(screening.id, secondsAfter(new Date(), -14 * day - 60));
    await expect(inviteeOf({ token: old, from: 'home' })).rejects.toMatchObject({ code: 'expired' });
    const first = await mailedToken(screening.id, secondsAfter(new Date(), -13 * day));
    expect(await inviteeOf({ token: first, from: 'home' })).toMatchObject({ screeningId: screening.id });
    await withWork(scene.coordinator, 'consent.send-link', (work) => sendConsentLink(work, { id }));
    const second = await mailedToken(screening.id);
    await expect(inviteeOf({ token: first, from: 'home' })).rejects.toMatchObject({ code: 'expired' });
    expect(await inviteeOf({ token: second, from: 'home' })).toMatchObject({ screeningId: screening.id });
  });

  test('a link does not sign what was moved to the tablet, and its holder cannot countersign', async () => {
    const { id, screening } = await start('home');
    const invitee = await inviteeOf({ token: await mailedToken(screening.id), from: 'home' });
    await readAll(invitee, id);
    await expect(countersign(invitee, id)).rejects.toMatchObject({ code: 'forbidden' });
    const moved = await withWork(scene.coordinator, 'consent.start', (work) => startConsent(work, { id: screening.id, mode: 'tablet' }));
    expect(moved.id).toBe(id);
    await expect(sign(invitee, id)).rejects.toMatchObject({ code: 'conflict' });
    // What was read stays read: nothing is asked twice.
    expect(await sign(screening.atTablet, id)).toMatchObject({ state: 'signed by participant' });
  });

  test('guessing links is throttled', async () => {
    const guess = () => inviteeOf({ token: 'not-a-token', from: 'a guesser' }).catch((error: { code: string }) => error.code);
    const answers: unknown[] = [];
    for (let tries = 0; tries < 21; tries += 1) answers.push(await guess());
    expect(answers.slice(0, 20)).toEqual(Array.from({ length: 20 }, () => 'expired'));
    expect(answers[20]).toBe('too-many');
  });

  test('without an address there is no link', async () => {
    const screening = await givenScreening(scene.site, scene.protocol);
    await asOwner('update participant_identity set email = null where screening_id = $1', [screening.id]);
    await expect(withWork(scene.coordinator, 'consent.start', (work) => startConsent(work, { id: screening.id, mode: 'home' }))).rejects.toMatchObject({ code: 'invalid', field: 'email' });
  });
});

describe('the participant’s copy', () => {
  test('is made once, kept, and mailed as a whole PDF; only the own site and the trail know of it', async () => {
    const { id, screening } = await start('tablet');
    await readAll(screening.atTablet, id);
    await sign(screening.atTablet, id, { signature: { kind: 'drawn', path: 'M10.0 60.0L80.0 20.0L150.5 90.0', width: 300, height: 120 } });
    await expect(withWork(scene.coordinator, 'consent.file', (work) => fetchConsentFile(work, { id, which: 'copy' }))).rejects.toMatchObject({ code: 'not-found' });
    await countersign(scene.coordinator, id);
    const sent: Posting[] = [];
    const deps = jobDeps((_letter, posting) => Promise.resolve(void sent.push(posting)));
    await consentCopy.run({ siteId: scene.site.id, consentId: id }, deps);
    await consentCopy.run({ siteId: scene.site.id, consentId: id }, deps);
    expect(sent.map(({ to }) => to)).toEqual([screening.email, screening.email]);
    const [first, second] = sent.map(({ attachments }) => attachments?.[0]?.content);
    expect(await recogniseForm(first ?? Buffer.alloc(0))).toMatchObject({ contentType: 'application/pdf' });
    expect(second).toEqual(first);
    const served = await withWork(scene.coordinator, 'consent.file', (work) => fetchConsentFile(work, { id, which: 'copy' }));
    expect(served).toMatchObject({ contentType: 'application/pdf', byteCount: first?.length, filename: 'consent-copy.pdf' });
    await expect(withWork(scene.otherCoordinator, 'consent.file', (work) => fetchConsentFile(work, { id, which: 'copy' }))).rejects.toMatchObject({ code: 'not-found' });
    const trail = await asOwner(`select act from audit_entry where op = 'EVENT' and table_name = 'stored_file' and act = 'consent.file' and site_id = $1`, [scene.site.id]);
    expect(trail).toHaveLength(1);
  });
});

describe('the data base', () => {
  test('refuses a complete consent without both signatures, whoever writes it', async () => {
    const screening = await givenScreening(scene.site, scene.protocol);
    const { id } = await givenConsent(screening, scene.protocol, scene.coordinator, 'signed by participant');
    await expect(asOwner(`update consent set state = 'complete' where id = $1`, [id])).rejects.toMatchObject({ code: '23514' });
  });

  test('takes no signature for somebody else, whichever service writes it', async () => {
    const screening = await givenScreening(scene.site, scene.protocol);
    const { id } = await givenConsent(screening, scene.protocol, scene.coordinator, 'reading');
    const investigator = await givenStaff('site-investigator', scene.site);
    const write = (who: 'participant' | 'staff', name: string, accountId: string | null) =>
      withWork(scene.coordinator, 'consent.countersign', (work) =>
        work.sql(`insert into consent_signature (consent_id, screening_id, site_id, who, means, name, account_id, signed_at, content_sha256) values (?, ?, ?, ?, 'typed', ?, ?, ?, '0')`, [id, screening.id, scene.site.id, who, name, accountId, work.now]),
      );
    await expect(write('participant', screening.name, null)).rejects.toMatchObject({ code: '42501' });
    await expect(write('staff', staffName(investigator), investigator.accountId)).rejects.toMatchObject({ code: '42501' });
    await expect(write('staff', 'Somebody Else', scene.coordinator.accountId)).rejects.toMatchObject({ code: '42501' });
    await expect(write('staff', staffName(scene.coordinator), null)).rejects.toMatchObject({ code: '42501' });
    await expect(write('staff', staffName(scene.coordinator), scene.coordinator.accountId)).resolves.toBeDefined();
  });

  test('keeps no drawing that no page can hold', async () => {
    const screening = await givenScreening(scene.site, scene.protocol);
    const { id } = await givenConsent(screening, scene.protocol, scene.coordinator, 'reading');
    const keep = (drawing: object) =>
      asOwner(`insert into consent_signature (consent_id, screening_id, site_id, who, means, name, drawing, signed_at, content_sha256) values ($1, $2, $3, 'participant', 'drawn', 'Ada', $4, now(), '0')`, [id, screening.id, scene.site.id, JSON.stringify(drawing)]);
    for (const path of [`M1 1L${'9'.repeat(400)}1 1`, 'M1 1L-5 4', 'M1 1"', ''])
      await expect(keep({ path, width: 300, height: 120 })).rejects.toMatchObject({ code: '23514' });
    await expect(keep({ path: 'M1 1L200.5 80', width: 300, height: 120 })).resolves.toEqual([]);
  });

  test('holds one open consent for a screening', async () => {
    const screening = await givenScreening(scene.site, scene.protocol);
    await givenConsent(screening, scene.protocol, scene.coordinator, 'reading');
    await expect(givenConsent(screening, scene.protocol, scene.coordinator, 'reading')).rejects.toMatchObject({ code: 'conflict' });
  });

  test('shows no signature and no name to a monitor’s transaction, even one that reaches the site', async () => {
    const screening = await givenScreening(scene.site, scene.protocol);
    await givenConsent(screening, scene.protocol, scene.coordinator);
    for (const role of ['monitor', 'investigator', 'data-manager', 'assessor', 'auditor'] as const) {
      const staff = await givenStaff(role, scene.site);
      const seen = await withWork(staff, role === 'investigator' ? 'results.view' : 'screening.list', async (work) => ({
        identity: await work.sql('select * from participant_identity'),
        signatures: await work.sql('select * from consent_signature'),
        files: await work.sql('select * from stored_file'),
        links: await work.sql('select * from invitation'),
        trail: await work.sql(`select * from audit_entry where table_name in ('participant_identity', 'consent_signature')`),
      }));
      expect(seen).toEqual({ identity: [], signatures: [], files: [], links: [], trail: [] });
    }
  });
});
