import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { beginAssessment } from '@/lib/measurement/begin-assessment';
import { saveTrial } from '@/lib/measurement/save-trial';
import { viewAssessment } from '@/lib/measurement/view-assessment';
import { addVisit } from '@/lib/schedule/add-unscheduled-visit';
import { beginVisit } from '@/lib/schedule/begin-visit';
import { bookVisit } from '@/lib/schedule/book-visit';
import { completeVisit } from '@/lib/schedule/complete-visit';
import { missVisit } from '@/lib/schedule/miss-visit';
import { undoBegin } from '@/lib/schedule/undo-begin';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenParticipant, givenScene, givenStaff, setScene, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
let monitor: Actor;
let who: GivenParticipant;
beforeAll(async () => {
  scene = await givenScene();
  monitor = await givenStaff('monitor', scene.site);
});
beforeEach(async () => {
  who = await givenParticipant(scene.site, scene.protocol, scene.coordinator, { enrolledOn: '2027-06-01' });
});

const id = (key = 'baseline') => who.visits[key] ?? '';
const begin = (key = 'baseline', now = new Date('2027-06-03T10:00:00Z'), actor = scene.coordinator, expectedVersion = 1, windowReason?: string) =>
  withWork(actor, 'visit.begin', (work) => beginVisit(work, { id: id(key), windowReason }), { expectedVersion, now });
const why = 'No other day could be found.';

describe('a visit', () => {
  test('begins on the calendar day of its site, not of the server', async () => {
    // 23:30 UTC is half past midnight of the next day by London's summer clock.
    expect(await begin('baseline', new Date('2027-06-03T23:30:00Z'))).toMatchObject({ state: 'in progress', doneOn: '2027-06-04' });
  });

  test('is labelled early, in window or late, and is kept whichever it is', async () => {
    // Week 12 is due 84 days on, on 24 August, 14 days either way.
    expect((await begin('week-12', new Date('2027-08-09T10:00:00Z'), scene.coordinator, 1, why)).place).toEqual({ status: 'early', deltaDays: -15 });
    who = await givenParticipant(scene.site, scene.protocol, scene.coordinator, { enrolledOn: '2027-06-01' });
    expect((await begin('week-12', new Date('2027-09-07T10:00:00Z'))).place).toEqual({ status: 'in', deltaDays: 14 });
    who = await givenParticipant(scene.site, scene.protocol, scene.coordinator, { enrolledOn: '2027-06-01' });
    expect((await begin('week-12', new Date('2027-09-08T10:00:00Z'), scene.coordinator, 1, why)).place).toEqual({ status: 'late', deltaDays: 15 });
  });

  test('out of its window begins only with the reason, which stays with it', async () => {
    const early = new Date('2027-08-09T10:00:00Z');
    await expect(begin('week-12', early)).rejects.toMatchObject({ code: 'invalid', field: 'windowReason', sentence: expect.stringContaining('opens on 2027-08-10, 1 day from today') as string });
    expect(await begin('week-12', early, scene.coordinator, 1, why)).toMatchObject({ state: 'in progress', windowReason: why });
    // Measuring begins a visit too, and asks the same.
    const measure = (windowReason?: string) => withWork(scene.coordinator, 'assessment.begin', (work) => beginAssessment(work, { id: id('month-6'), windowReason }), { now: early });
    await expect(measure()).rejects.toMatchObject({ code: 'invalid', field: 'windowReason' });
    expect(await measure(why)).toMatchObject({ state: 'open' });
    expect(await begin('baseline', undefined, scene.coordinator, 1, 'Not needed.')).toMatchObject({ windowReason: null });
  });

  test('does not begin before the enrolment, nor a year after the last window', async () => {
    await expect(begin('baseline', new Date('2027-05-31T10:00:00Z'), scene.coordinator, 1, why)).rejects.toMatchObject({ code: 'conflict' });
    // Month 6 closes 182 + 21 days after the enrolment, on 21 December 2027.
    await expect(begin('month-6', new Date('2028-12-21T10:00:00Z'), scene.coordinator, 1, why)).rejects.toMatchObject({ code: 'conflict' });
  });

  test('begun by mistake is set back with a reason, but not once anything was written down', async () => {
    const begun = await begin();
    const undo = (expectedVersion: number, reason = 'Begun at the wrong line.') => withWork(scene.coordinator, 'visit.correct', (work) => undoBegin(work, { id: id(), reason }), { expectedVersion, reason });
    const back = await undo(begun.version);
    expect(back).toMatchObject({ state: 'to come', doneOn: null, windowReason: null });
    const now = new Date('2027-06-10T10:00:00Z');
    const open = await withWork(scene.coordinator, 'assessment.begin', (work) => beginAssessment(work, { id: id() }), { now });
    const empty = await undo(back.version + 1);
    expect(await withWork(scene.coordinator, 'assessment.view', (work) => viewAssessment(work, { visitId: id() }))).toBeNull();
    const again = await withWork(scene.coordinator, 'assessment.begin', (work) => beginAssessment(work, { id: id() }), { now });
    expect(again.id).toBe(open.id);
    await withWork(scene.coordinator, 'assessment.save-trial', (work) => saveTrial(work, { id: open.id, side: 'left', trial: 1, circumferencesMm: Array.from({ length: 11 }, () => null) }));
    await expect(undo(empty.version + 1)).rejects.toMatchObject({ code: 'conflict' });
    const [trail] = await asOwner<{ reason: string; after: { state: string } }>(`select reason, after from audit_entry where table_name = 'visit' and row_id = $1 and act = 'visit.correct' order by id limit 1`, [id()]);
    expect(trail).toMatchObject({ reason: 'Begun at the wrong line.', after: { state: 'to come' } });
  });

  test('is missed only after its window closed', async () => {
    const miss = (now: string) => withWork(scene.coordinator, 'visit.miss', (work) => missVisit(work, { id: id('month-6'), missedReason: 'Unwell' }), { expectedVersion: 1, now: new Date(now) });
    await expect(miss('2027-12-21T10:00:00Z')).rejects.toMatchObject({ code: 'conflict', sentence: expect.stringContaining('until 2027-12-21') as string });
    expect(await miss('2027-12-22T10:00:00Z')).toMatchObject({ state: 'missed' });
  });

  test('is booked and added within the participant’s time in the study, and the data base keeps to it too', async () => {
    const now = new Date('2027-06-10T10:00:00Z');
    const book = (on: string) => withWork(scene.coordinator, 'visit.book', (work) => bookVisit(work, { id: id('week-12'), on, time: '09:30' }), { now });
    const add = (on: string) => withWork(scene.coordinator, 'visit.add', (work) => addVisit(work, { code: who.code, on, why: 'The arm feels fuller.' }), { now });
    for (const on of ['1900-01-01', '2027-06-09', '2028-12-21', '2099-01-01']) await expect(book(on)).rejects.toMatchObject({ code: 'invalid', field: 'on' });
    for (const on of ['1900-01-01', '2027-05-31', '2028-12-21', '2099-01-01']) await expect(add(on)).rejects.toMatchObject({ code: 'invalid', field: 'on' });
    expect(await book('2027-08-24')).toMatchObject({ bookedAt: '2027-08-24T08:30:00.000Z' });
    expect(await add('2028-12-20')).toMatchObject({ targetOn: '2028-12-20' });
    const asApp = (text: string) => setScene([scene.site.id], (work) => work.sql(text, [id('month-6')]));
    for (const change of [`booked_at = '9999-01-01'`, `booked_at = '1900-01-01'`, `state = 'in progress', done_on = '2027-05-31'`, `state = 'in progress', done_on = '2029-01-01'`, `unscheduled_reason = 'x', target_on = '2029-01-01', closes_on = '2029-01-02'`])
      await expect(asApp(`update visit set ${change} where id = ?`)).rejects.toMatchObject({ code: 'invalid' });
    await expect(asApp(`update visit set done_on = '2027-12-01' where id = ?`)).rejects.toThrow(/check constraint/);
  });

  test('is booked by the clock of the site', async () => {
    const booked = await withWork(scene.coordinator, 'visit.book', (work) => bookVisit(work, { id: id(), on: '2027-06-10', time: '09:30' }), { expectedVersion: 1 });
    expect(booked.bookedAt).toBe('2027-06-10T08:30:00.000Z');
  });

  test('that did not take place keeps its reason, and cannot be begun', async () => {
    const missed = await withWork(scene.coordinator, 'visit.miss', (work) => missVisit(work, { id: id(), missedReason: 'Unwell' }), { expectedVersion: 1, now: new Date('2027-06-30T10:00:00Z') });
    expect(missed).toMatchObject({ state: 'missed', missedReason: 'Unwell', doneOn: null });
    await expect(begin('baseline', undefined, scene.coordinator, missed.version)).rejects.toMatchObject({ code: 'locked' });
  });

  test('that two people change at once is saved by the first, and the second is told', async () => {
    await begin();
    await expect(withWork(scene.coordinator, 'visit.miss', (work) => missVisit(work, { id: id(), missedReason: 'Unwell' }), { expectedVersion: 1 })).rejects.toMatchObject({ code: 'stale' });
  });

  test('ends without measuring, but not over an unfinished assessment', async () => {
    const begun = await begin();
    const end = (expectedVersion: number) => withWork(scene.coordinator, 'visit.complete', (work) => completeVisit(work, { id: id() }), { expectedVersion });
    await withWork(scene.coordinator, 'assessment.begin', (work) => beginAssessment(work, { id: id() }), { now: new Date('2027-06-03T11:00:00Z') });
    await expect(end(begun.version)).rejects.toMatchObject({ code: 'conflict' });
    who = await givenParticipant(scene.site, scene.protocol, scene.coordinator, { enrolledOn: '2027-06-01' });
    expect(await end((await begin()).version)).toMatchObject({ state: 'complete' });
  });

  test('is added for a reason, inside the site’s reach only', async () => {
    const add = (actor: Actor, on = '2027-06-20') => withWork(actor, 'visit.add', (work) => addVisit(work, { code: who.code, on, why: 'The arm feels fuller.' }));
    expect(await add(scene.coordinator)).toMatchObject({ key: 'extra', unscheduledReason: 'The arm feels fuller.', opensOn: '2027-06-20' });
    await expect(add(scene.otherCoordinator)).rejects.toMatchObject({ code: 'not-found' });
    await expect(add(scene.coordinator, '2027-05-01')).rejects.toMatchObject({ code: 'invalid', field: 'on' });
  });

  test('is not changed by a monitor, and of another site does not exist', async () => {
    await expect(begin('baseline', undefined, monitor)).rejects.toMatchObject({ code: 'forbidden' });
    await expect(begin('baseline', undefined, scene.otherCoordinator)).rejects.toMatchObject({ code: 'not-found' });
  });
});
