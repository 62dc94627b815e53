import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { beginAssessment } from '@/lib/measurement/begin-assessment';
import { addVisit } from '@/lib/schedule/add-unscheduled-visit';
import { beginVisit } from '@/lib/schedule/begin-visit';
import { bookVisit } from '@/lib/schedule/book-visit';
import { completeVisit } from '@/lib/schedule/complete-visit';
import { missVisit } from '@/lib/schedule/miss-visit';
import { withWork } from '@/lib/work/with-work';
import { givenParticipant, givenScene, givenStaff, type GivenParticipant, type GivenScene } from '../given';

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
const begin = (key = 'baseline', now = new Date('2027-06-03T10:00:00Z'), actor = scene.coordinator, expectedVersion = 1) =>
  withWork(actor, 'visit.begin', (work) => beginVisit(work, { id: id(key) }), { expectedVersion, now });

describe('a visit', () => {
  test('begins on the calendar day of its site, not of the server', async () => {
    // 23:30 UTC is half past midnight of the next day by London's summer clock.
    expect(await begin('baseline', new Date('2027-06-03T23:30:00Z'))).toMatchObject({ state: 'in progress', doneOn: '2027-06-04' });
  });

  test('is labelled early, in window or late, and is kept whichever it is', async () => {
    // Week 12 is due 84 days on, on 24 August, 14 days either way.
    expect((await begin('week-12', new Date('2027-08-09T10:00:00Z'))).place).toEqual({ status: 'early', deltaDays: -15 });
    who = await givenParticipant(scene.site, scene.protocol, scene.coordinator, { enrolledOn: '2027-06-01' });
    expect((await begin('week-12', new Date('2027-09-07T10:00:00Z'))).place).toEqual({ status: 'in', deltaDays: 14 });
    who = await givenParticipant(scene.site, scene.protocol, scene.coordinator, { enrolledOn: '2027-06-01' });
    expect((await begin('week-12', new Date('2027-09-08T10:00:00Z'))).place).toEqual({ status: 'late', deltaDays: 15 });
  });

  test('is booked by the clock of the site', async () => {
    const booked = await withWork(scene.coordinator, 'visit.book', (work) => bookVisit(work, { id: id(), on: '2027-06-10', time: '09:30' }), { expectedVersion: 1 });
    expect(booked.bookedAt).toBe('2027-06-10T08:30:00.000Z');
  });

  test('that did not take place keeps its reason, and cannot be begun', async () => {
    const missed = await withWork(scene.coordinator, 'visit.miss', (work) => missVisit(work, { id: id(), missedReason: 'Unwell' }), { expectedVersion: 1 });
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
    await withWork(scene.coordinator, 'assessment.begin', (work) => beginAssessment(work, { id: id() }));
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
