import { beforeAll, describe, expect, test, vi } from 'vitest';
import { isParticipantCode } from '@/instruments/participant-code';
import type { Actor } from '@/lib/auth/roles';
import { answerCriterion } from '@/lib/enrolment/answer-criterion';
import { confirmEligibility } from '@/lib/enrolment/confirm-eligibility';
import { correctIdentity } from '@/lib/enrolment/correct-identity';
import { enrolParticipant } from '@/lib/enrolment/enrol-participant';
import { enrolInput, openScreeningInput } from '@/lib/enrolment/input';
import { leaveScreening } from '@/lib/enrolment/leave-screening';
import { listScreenings } from '@/lib/enrolment/list-screenings';
import { viewIdentity } from '@/lib/enrolment/view-identity';
import { viewScreening } from '@/lib/enrolment/view-screening';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenConsent, givenScene, givenScreening, givenSite, givenStaff, type GivenScene } from '../given';
import { smallProtocol } from '../given-protocol';

let signedIn: Actor | null = null;
vi.mock('@/lib/web/session', () => ({ currentSession: () => Promise.resolve(signedIn ? { actor: signedIn } : null) }));
const { POST: openRoute } = await import('@/app/api/screenings/route');
const { PUT: answersRoute } = await import('@/app/api/screenings/[id]/answers/route');
const { POST: enrolRoute } = await import('@/app/api/screenings/[id]/enrol/route');

let scene: GivenScene;
beforeAll(async () => {
  scene = await givenScene();
});

const now = new Date('2027-03-01T09:00:00Z');
const address = 'http://127.0.0.1:3000';
const facts = {
  affectedSide: 'left',
  dominantSide: 'right',
  surgeryOn: '2026-09-01',
  surgery: 'mastectomy',
  axillaryProcedure: 'axillary-dissection',
  nodesRemoved: '12',
  radiotherapy: 'regional-nodes',
  systemicTherapy: 'chemotherapy-taxane',
  heightCm: '165,5',
} as const;

const post = (handler: typeof openRoute, path: string, body: object, params: Record<string, string>, key: string) =>
  handler(new Request(`${address}${path}`, { method: 'POST', body: JSON.stringify(body), headers: { origin: address, 'idempotency-key': key } }), { params: Promise.resolve(params) });

const readyToEnrol = async (about: Parameters<typeof givenScreening>[2] = {}) => {
  const screening = await givenScreening(scene.site, scene.protocol, { confirmedBy: scene.coordinator, ...about });
  await givenConsent(screening, scene.protocol, scene.coordinator);
  return screening;
};
const enrol = (actor: Actor, id: string, change: object = {}) =>
  withWork(actor, 'participant.enrol', (work) => enrolParticipant(work, enrolInput.parse({ ...facts, id, ...change })), { now });
const answer = (actor: Actor, id: string, criterion: string, value: 'yes' | 'no') =>
  withWork(actor, 'screening.answer', (work) => answerCriterion(work, { id, criterion, answer: value }));
const confirm = (actor: Actor, id: string) => withWork(actor, 'screening.confirm', (work) => confirmEligibility(work, { id }));

describe('screening', () => {
  const person = { name: 'Ada Example', email: 'Ada@Home.Example', phone: '', bornOn: '1968-04-12', cohort: 'at-risk', screenedOn: '2026-11-20', referredBy: '' };

  test('a screening opened twice with one key is one screening, with its identity in its own table', async () => {
    signedIn = scene.coordinator;
    const key = 'open-once-0123456789';
    const [first, second] = [await post(openRoute, '/api/screenings', person, {}, key), await post(openRoute, '/api/screenings', person, {}, key)];
    expect([first.status, second.status]).toEqual([201, 201]);
    const [one, two] = [(await first.json()) as { id: string }, (await second.json()) as { id: string }];
    expect(two).toEqual(one);
    expect(await withWork(scene.coordinator, 'identity.view', (work) => viewIdentity(work, one))).toMatchObject({ name: 'Ada Example', email: 'ada@home.example', phone: null });
    const kept = await asOwner<{ body: object }>('select body from idempotency_key where key = $1', [key]);
    expect(JSON.stringify(kept)).not.toMatch(/ada/i);
  });

  test('wrong entries come back with a sentence at each field, all at once', async () => {
    signedIn = scene.coordinator;
    const wrong = await post(openRoute, '/api/screenings', { ...person, name: ' ', email: 'ada@', screenedOn: '2026-02-30' }, {}, 'open-wrong-0123456789');
    expect(wrong.status).toBe(422);
    const { fields } = (await wrong.json()) as { fields: { field: string; sentence: string }[] };
    expect(fields.map(({ field }) => field).sort()).toEqual(['email', 'name', 'screenedOn']);
    const tomorrow = await post(openRoute, '/api/screenings', { ...person, screenedOn: '2099-01-01' }, {}, 'open-later-0123456789');
    expect(await tomorrow.json()).toMatchObject({ fields: [{ field: 'screenedOn', sentence: '1 Jan 2099 is still to come. Give the day of screening.' }] });
  });

  test('empty contact is none, and an address is kept in small letters', () => {
    expect(openScreeningInput.parse(person)).toMatchObject({ email: 'ada@home.example', phone: null, referredBy: null });
    expect(openScreeningInput.parse({ ...person, email: '' })).toMatchObject({ email: null });
  });

  test('a wrong answer says which criterion stops it, and confirming keeps who and when', async () => {
    const { id } = await givenScreening(scene.site, scene.protocol);
    const investigator = await givenStaff('site-investigator', scene.site);
    await expect(confirm(scene.coordinator, id)).rejects.toMatchObject({ code: 'forbidden' });
    await expect(confirm(investigator, id)).rejects.toMatchObject({ code: 'invalid', message: expect.stringContaining('3 criteria are not answered yet') as string });
    await answer(scene.coordinator, id, 'adult', 'yes');
    await answer(scene.coordinator, id, 'treated', 'yes');
    expect(await answer(scene.coordinator, id, 'metastases', 'yes')).toMatchObject({ stops: true });
    await expect(confirm(investigator, id)).rejects.toMatchObject({
      message: 'Not eligible. ‘Has distant metastases’ is answered yes, and the protocol asks for no.',
      field: 'criterion-metastases',
    });
    expect(await answer(scene.coordinator, id, 'metastases', 'no')).toMatchObject({ stops: false });
    await confirm(investigator, id);
    const view = await withWork(scene.coordinator, 'screening.view', (work) => viewScreening(work, { id }));
    expect(view.eligibility).toMatchObject({ confirmedBy: investigator.label });
    await expect(answer(scene.coordinator, id, 'metastases', 'yes')).rejects.toMatchObject({ code: 'locked' });
  });

  test('a screening that ends without enrolment keeps its reason, counts in the flow, and cannot go on', async () => {
    const { site, protocol, coordinator } = await givenScene();
    const gone = await givenScreening(site, protocol);
    await givenScreening(site, protocol);
    await withWork(coordinator, 'screening.leave', (work) => leaveScreening(work, { id: gone.id, notEnrolledReason: 'Declined: no time', note: 'Works nights.' }));
    const list = await withWork(coordinator, 'screening.list', (work) => listScreenings(work, { page: 0, pageSize: 5, sort: 'number', direction: 'asc' }));
    expect(list.counts).toEqual({ screened: 2, enrolled: 0, notEnrolled: 1, open: 1, reasons: [{ reason: 'Declined: no time', count: 1 }] });
    expect(list.rows.map(({ number, state, notEnrolledReason }) => [number, state, notEnrolledReason])).toEqual([
      [1, 'not enrolled', 'Declined: no time'],
      [2, 'screening', null],
    ]);
    await expect(answer(coordinator, gone.id, 'adult', 'yes')).rejects.toMatchObject({ code: 'locked' });
    await expect(withWork(coordinator, 'screening.leave', (work) => leaveScreening(work, { id: gone.id, notEnrolledReason: 'Not eligible' }))).rejects.toMatchObject({ code: 'conflict' });
  });

  test('the log is paged by the server and shows each role only its sites', async () => {
    const { study, site, otherSite, protocol, coordinator, otherCoordinator } = await givenScene();
    for (let count = 0; count < 7; count += 1) await givenScreening(site, protocol);
    await givenScreening(otherSite, protocol);
    const list = (actor: Actor, page: number) => withWork(actor, 'screening.list', (work) => listScreenings(work, { page, pageSize: 5, sort: 'number', direction: 'desc' }));
    expect((await list(coordinator, 0)).rows.map(({ number }) => number)).toEqual([7, 6, 5, 4, 3]);
    expect((await list(coordinator, 1)).rows.map(({ number }) => number)).toEqual([2, 1]);
    expect(await list(otherCoordinator, 0)).toMatchObject({ rowCount: 1, counts: { screened: 1 } });
    const monitor = await givenStaff('monitor', [site, otherSite]);
    expect(await list(monitor, 0)).toMatchObject({ rowCount: 8 });
    await expect(list(await givenStaff('investigator', await givenSite(study)), 0)).rejects.toMatchObject({ code: 'forbidden' });
  });

  test('name and contact are read and corrected by the own site only, and each reading is in the trail', async () => {
    const { id } = await givenScreening(scene.site, scene.protocol);
    const view = (actor: Actor) => withWork(actor, 'identity.view', (work) => viewIdentity(work, { id }));
    const { version } = await view(scene.coordinator);
    await expect(view(scene.otherCoordinator)).rejects.toMatchObject({ code: 'not-found' });
    for (const role of ['monitor', 'investigator', 'assessor', 'data-manager', 'auditor', 'administrator'] as const)
      await expect(view(await givenStaff(role, scene.site))).rejects.toMatchObject({ code: 'forbidden' });
    const change = { id, name: 'Ada Example-Smith', email: 'ada.smith@home.example', phone: null, bornOn: '1968-04-12' };
    const correct = (actor: Actor, expectedVersion: number) => withWork(actor, 'identity.correct', (work) => correctIdentity(work, change), { expectedVersion });
    await expect(correct(scene.otherCoordinator, version)).rejects.toMatchObject({ code: 'not-found' });
    await correct(scene.coordinator, version);
    await expect(correct(scene.coordinator, version)).rejects.toMatchObject({ code: 'stale' });
    const trail = await asOwner(`select 1 from audit_entry where op = 'EVENT' and act = 'identity.view' and row_id = (select id::text from participant_identity where screening_id = $1)`, [id]);
    expect(trail).toHaveLength(1);
  });
});

describe('after the signature', () => {
  const correct = (id: string, change: { name?: string; bornOn?: string | null }, reason?: string) =>
    withWork(scene.coordinator, 'identity.correct', (work) => correctIdentity(work, { id, name: 'Ada Example', email: 'ada@home.example', phone: null, bornOn: '1968-04-12', ...change }), reason ? { reason } : {});

  test('name and contact change with a reason only, which the trail keeps; before it they need none', async () => {
    const before = await givenScreening(scene.site, scene.protocol);
    await expect(correct(before.id, {})).resolves.toBeDefined();
    const { id } = await readyToEnrol();
    expect(await withWork(scene.coordinator, 'identity.view', (work) => viewIdentity(work, { id }))).toMatchObject({ needsReason: true });
    await expect(correct(id, {})).rejects.toMatchObject({ code: 'invalid', field: 'reason' });
    await correct(id, {}, 'Written wrongly');
    const trail = await asOwner(`select reason from audit_entry where act = 'identity.correct' and op = 'UPDATE' and after ->> 'screening_id' = $1`, [id]);
    expect(trail).toEqual([{ reason: 'Written wrongly' }]);
  });

  test('the data base asks for the reason too, of identity and of an answer that was confirmed', async () => {
    const { id } = await readyToEnrol();
    await expect(withWork(scene.coordinator, 'identity.correct', (work) => work.sql(`update participant_identity set born_on = '2015-01-01' where screening_id = ?`, [id]))).rejects.toMatchObject({ code: 'invalid', field: 'reason' });
    await expect(withWork(scene.coordinator, 'screening.answer', (work) => work.sql(`update eligibility_answer set answer = 'no' where screening_id = ? and criterion = 'adult'`, [id]))).rejects.toMatchObject({ code: 'invalid', field: 'reason' });
  });

  test('nobody becomes a minor, and the age at enrolment follows the date of birth', async () => {
    const { id } = await readyToEnrol();
    await expect(correct(id, { bornOn: '2015-01-01' }, 'Written wrongly')).rejects.toMatchObject({ code: 'invalid', field: 'bornOn' });
    const { participantId } = await enrol(scene.coordinator, id);
    const age = async () => (await asOwner<{ age_years: number }>('select age_years from participant where id = $1', [participantId]))[0]?.age_years;
    // Enrolled on 1 March 2027: born on 12 April 1968 that is 58 years; on 1 March 1967 it is the 60th birthday, a day later 59.
    expect(await age()).toBe(58);
    await correct(id, { bornOn: '1967-03-01' }, 'Written wrongly');
    expect(await age()).toBe(60);
    await correct(id, { bornOn: '1967-03-02' }, 'Written wrongly');
    expect(await age()).toBe(59);
    await expect(correct(id, { bornOn: null }, 'Taken away')).rejects.toMatchObject({ code: 'invalid', field: 'bornOn' });
    await expect(correct(id, { bornOn: '2015-01-01' }, 'Written wrongly')).rejects.toMatchObject({ code: 'invalid', field: 'bornOn' });
    expect(await age()).toBe(59);
  });
});

test('an answer changes only from the version that was seen', async () => {
  const { id } = await givenScreening(scene.site, scene.protocol);
  const answerSeeing = (value: 'yes' | 'no', expectedVersion: number) => withWork(scene.coordinator, 'screening.answer', (work) => answerCriterion(work, { id, criterion: 'adult', answer: value }), { expectedVersion });
  const first = await Promise.allSettled([answerSeeing('yes', 0), answerSeeing('no', 0)]);
  expect(first.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
  await expect(answerSeeing('no', 0)).rejects.toMatchObject({ code: 'stale' });
  expect(await answerSeeing('no', 1)).toMatchObject({ answer: 'no', version: 2 });
  signedIn = scene.coordinator;
  const blind = await answersRoute(new Request(`${address}/api/screenings/${id}/answers`, { method: 'PUT', body: JSON.stringify({ criterion: 'adult', answer: 'yes' }), headers: { origin: address } }), { params: Promise.resolve({ id }) });
  expect(blind.status).toBe(428);
});

describe('enrolment', () => {
  test('issues a code, lays out the visits in their windows with their questionnaires, opens an account and asks for the letter', async () => {
    const { id } = await readyToEnrol();
    const { participantId, code, visitCount } = await enrol(scene.coordinator, id);
    expect(isParticipantCode(code)).toBe(true);
    expect(visitCount).toBe(3);
    const [participant] = await asOwner('select age_years, height_mm, nodes_removed, enrolled_on::text, anchor_on::text, cohort, state from participant where id = $1', [participantId]);
    expect(participant).toEqual({ age_years: 58, height_mm: 1655, nodes_removed: 12, enrolled_on: '2027-03-01', anchor_on: '2027-03-01', cohort: 'at-risk', state: 'enrolled' });
    // 2027-03-01 and 84 days is 24 May, 182 days is 30 August, counted on a calendar: Mar 30 left, Apr 30, May 24; and on.
    const visits = await asOwner('select key, opens_on::text as opens, target_on::text as target, closes_on::text as closes from visit where participant_id = $1 order by target_on', [participantId]);
    expect(visits).toEqual([
      { key: 'baseline', opens: '2027-03-01', target: '2027-03-01', closes: '2027-03-29' },
      { key: 'week-12', opens: '2027-05-10', target: '2027-05-24', closes: '2027-06-07' },
      { key: 'month-6', opens: '2027-08-09', target: '2027-08-30', closes: '2027-09-20' },
    ]);
    const due = await asOwner(`select v.key, count(*)::int as n from questionnaire_response q join visit v on v.id = q.visit_id where q.participant_id = $1 and q.state = 'due' group by 1 order by 1`, [participantId]);
    expect(due).toEqual([{ key: 'baseline', n: 3 }, { key: 'month-6', n: 3 }, { key: 'week-12', n: 1 }]);
    const accounts = await asOwner('select a.state, g.role, g.label from account a join role_grant g on g.account_id = a.id where g.of_participant_id = $1', [participantId]);
    expect(accounts).toEqual([{ state: 'invited', role: 'participant', label: code }]);
    const jobs = await asOwner<{ data: object }>(`select data from pgboss.job where name = 'participant.invite' and data ->> 'participantId' = $1`, [participantId]);
    expect(jobs).toEqual([{ data: { participantId, siteId: scene.site.id } }]);
    const view = await withWork(scene.coordinator, 'screening.view', (work) => viewScreening(work, { id }));
    expect(view).toMatchObject({ state: 'enrolled', participantCode: code });
  });

  test('without confirmed eligibility, or without complete consent, the service refuses', async () => {
    const unconfirmed = await givenScreening(scene.site, scene.protocol);
    await givenConsent(unconfirmed, scene.protocol, scene.coordinator);
    await expect(enrol(scene.coordinator, unconfirmed.id)).rejects.toMatchObject({ code: 'conflict', message: expect.stringContaining('Confirm eligibility first') as string });
    const halfSigned = await givenScreening(scene.site, scene.protocol, { confirmedBy: scene.coordinator });
    await givenConsent(halfSigned, scene.protocol, scene.coordinator, 'signed by participant');
    await expect(enrol(scene.coordinator, halfSigned.id)).rejects.toMatchObject({ code: 'conflict', message: expect.stringContaining('Consent is not complete') as string });
  });

  test('the data base refuses a participant without complete consent, whoever writes it', async () => {
    const insert = `insert into participant (site_id, code, number, cohort, affected_side, dominant_side, age_years, surgery_on, surgery, axillary_procedure, radiotherapy, systemic_therapy, enrolled_on, anchor_on, protocol_version_id)
      values ($1, 'ZZ-9999Z', 9999, 'at-risk', 'left', 'right', 58, '2026-09-01', 'mastectomy', 'none', 'none', 'none', '2027-01-06', '2027-01-06', $2)`;
    await expect(asOwner(insert, [scene.site.id, scene.protocol.id])).rejects.toMatchObject({ code: 'TM002' });
  });

  test('people who enrol at one moment get consecutive numbers', async () => {
    const { site, protocol, coordinator } = await givenScene();
    const ready = await Promise.all(
      Array.from({ length: 6 }, async () => {
        const screening = await givenScreening(site, protocol, { confirmedBy: coordinator });
        await givenConsent(screening, protocol, coordinator);
        return screening.id;
      }),
    );
    const enrolled = await Promise.all(ready.map((id) => enrol(coordinator, id)));
    expect(enrolled.map(({ code }) => Number(code.slice(3, 7))).sort((a, b) => a - b)).toEqual([1, 2, 3, 4, 5, 6]);
  });

  test('a submit pressed twice enrols once; without the key the second is refused', async () => {
    const { id } = await readyToEnrol();
    signedIn = scene.coordinator;
    const send = (key: string) => post(enrolRoute, `/api/screenings/${id}/enrol`, facts, { id }, key);
    const [first, second] = await Promise.all([send('enrol-once-0123456789'), send('enrol-once-0123456789')]);
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(await second.json()).toEqual(await first.json());
    expect((await send('enrol-again-0123456789')).status).toBe(409);
    expect(await asOwner('select count(*)::int as n from participant_identity where screening_id = $1 and participant_id is not null', [id])).toEqual([{ n: 1 }]);
  });

  test('a number is not lost when enrolment is refused', async () => {
    const { site, protocol, coordinator } = await givenScene();
    const ready = async (bornOn: string) => {
      const screening = await givenScreening(site, protocol, { confirmedBy: coordinator, bornOn });
      await givenConsent(screening, protocol, coordinator);
      return screening.id;
    };
    await expect(enrol(coordinator, await ready('2010-05-05'))).rejects.toMatchObject({ code: 'invalid', field: 'bornOn' });
    expect((await enrol(coordinator, await ready('1950-05-05'))).code).toMatch(/-0001/);
  });

  test.each([
    ['surgeryOn', { surgeryOn: '2027-03-02' }],
    ['surgeryOn', { surgeryOn: '2027-02-02' }],
    ['nodesRemoved', { axillaryProcedure: 'none', nodesRemoved: '3' }],
  ])('facts that contradict each other are refused at %s', async (field, change) => {
    const { id } = await readyToEnrol();
    await expect(enrol(scene.coordinator, id, change)).rejects.toMatchObject({ code: 'invalid', field });
  });

  test.each([
    ['1.65', '1.65 looks like metres. Give the height in centimetres, as 165.'],
    ['16', '16 cm is outside 120 to 210. Check the height.'],
    ['tall', 'Give the height in centimetres, in digits, as 165.'],
  ])('a height of %s is asked again', (heightCm, sentence) => {
    const parsed = enrolInput.safeParse({ ...facts, id: '00000000-0000-4000-8000-00000000000a', heightCm });
    expect(parsed.error?.issues.map(({ message }) => message)).toEqual([sentence]);
  });

  test('another site’s coordinator, an assessor and a monitor enrol nobody', async () => {
    const { id } = await readyToEnrol();
    await expect(enrol(scene.otherCoordinator, id)).rejects.toMatchObject({ code: 'not-found' });
    for (const role of ['assessor', 'monitor', 'investigator'] as const) await expect(enrol(await givenStaff(role, scene.site), id)).rejects.toMatchObject({ code: 'forbidden' });
  });

  test('visits are counted from surgery where the protocol says so', async () => {
    const { site, protocol, coordinator } = await givenScene({ anchor: 'surgery', visits: smallProtocol.visits });
    const screening = await givenScreening(site, protocol, { confirmedBy: coordinator });
    await givenConsent(screening, protocol, coordinator);
    const { participantId } = await enrol(coordinator, screening.id);
    // 2026-09-01 and 84 days: Sep 29 left, Oct 31, Nov 24.
    expect(await asOwner(`select target_on::text as target from visit where participant_id = $1 and key = 'week-12'`, [participantId])).toEqual([{ target: '2026-11-24' }]);
  });
});
