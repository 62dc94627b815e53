import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { listClosedReports, listOpenReports } from '@/lib/safety/list-open-reports';
import { markReportRead } from '@/lib/safety/mark-report-read';
import { reportSymptoms } from '@/lib/safety/report-symptoms';
import type { ReportSymptomsInput } from '@/lib/safety/input';
import { reviewReport } from '@/lib/safety/review-report';
import { settleHold } from '@/lib/measurement/settle-hold';
import { viewReport } from '@/lib/safety/view-report';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenParticipant, givenScene, givenSite, givenStaff, setScene, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
beforeAll(async () => {
  scene = await givenScene();
});

const at = (moment: string) => ({ now: new Date(moment) });
const wednesday = '2027-03-03T10:00:00Z';
const person = () => givenParticipant(scene.site, scene.protocol, scene.coordinator);
const said = (change: Partial<ReportSymptomsInput> = {}): ReportSymptomsInput => ({
  clientKey: randomUUID(), noticedOn: '2027-03-03', signs: ['heavy'], lastedOverADay: true, soreness: null, note: null, ...change,
});
const report = (actor: Actor, input = said(), when = wednesday) => withWork(actor, 'symptom.report', (work) => reportSymptoms(work, input), at(when));
const read = (actor: Actor, id: string, when = wednesday) => withWork(actor, 'symptom.read', (work) => markReportRead(work, { id }), at(when));
const review = (actor: Actor, id: string, change: Partial<Parameters<typeof reviewReport>[1]> = {}, when = '2027-03-04T09:00:00Z', version?: number) =>
  withWork(actor, 'symptom.review', (work) => reviewReport(work, { id, outcome: 'advice', note: 'Called; the change had passed.', ...change }), { ...at(when), ...(version === undefined ? {} : { expectedVersion: version }) });
const isHeld = async ({ id }: GivenParticipant) => (await asOwner<{ held: boolean }>('select training_held as held from participant where id = $1', [id]))[0]?.held;
const complete = ({ id, siteId, visits }: GivenParticipant, on: string) =>
  asOwner(
    `insert into limb_assessment (site_id, participant_id, visit_id, assessor_id, measured_at, position, sleeve_worn, method, start_offset_mm, step_mm, level_count, tolerance_mm, state, left_volume_ml, right_volume_ml, formula_version, completed_at)
     values ($1, $2, $3, $4, $5, 'seated', false, 'frustum', 0, 40, 11, 5, 'complete', 2000, 2000, '1', $5)`,
    [siteId, id, visits['week-12'], scene.coordinator.accountId, on],
  );

describe('a report', () => {
  // Levels and clocks: the safety table of the study (clinical.md 5.3); 'at once' is one hour, 'same day' four, set here.
  test.each([
    ['breathlessness', said({ signs: ['breathless', 'hot'] }), 'R3', '2027-03-03T11:00:00.000Z'],
    ['signs of sepsis', said({ signs: ['shaking', 'fever'] }), 'R1+', '2027-03-03T11:00:00.000Z'],
    ['sudden swelling', said({ signs: ['sudden-swelling'] }), 'R2', '2027-03-03T11:00:00.000Z'],
    ['a hot arm', said({ signs: ['hot'] }), 'R1', '2027-03-03T14:00:00.000Z'],
    ['a new lump', said({ signs: ['lump'] }), 'R4', '2027-03-05T17:00:00.000Z'],
    ['a heavier arm over a day', said({ signs: ['heavy'] }), 'S1', '2027-03-04T17:00:00.000Z'],
    ['soreness for ten days', said({ signs: [], soreness: { days: 10, onlyTrainedMuscles: true } }), 'S1', '2027-03-04T17:00:00.000Z'],
    ['soreness for two days', said({ signs: [], soreness: { days: 2, onlyTrainedMuscles: true } }), 'S0', null],
    ['a heavy arm that was well by the evening', said({ signs: ['heavy'], lastedOverADay: false }), 'S0', null],
  ] as const)('of %s has its level and its clock', async (_name, input, level, dueAt) => {
    const { actor } = await person();
    expect(await report(actor, { ...input, clientKey: randomUUID() })).toMatchObject({ level, dueAt, holdTraining: level !== 'S0' });
  });

  test.each([
    ['Friday', '2027-03-05T16:00:00Z', '2027-03-08T17:00:00.000Z'],
    ['Saturday', '2027-03-06T23:30:00Z', '2027-03-08T17:00:00.000Z'],
    ['Sunday', '2027-03-07T03:00:00Z', '2027-03-08T17:00:00.000Z'],
    // Summer time began on 28 March 2027 in Europe/London: 17:00 there is 16:00 UTC.
    ['the Friday before summer time', '2027-03-26T16:00:00Z', '2027-03-29T16:00:00.000Z'],
  ])('one working day from %s ends at the close of the next working day at the site', async (_day, when, dueAt) => {
    const { actor } = await person();
    expect(await report(actor, said(), when)).toMatchObject({ dueAt });
  });

  test('hours run through the weekend', async () => {
    const { actor } = await person();
    expect(await report(actor, said({ signs: ['red'] }), '2027-03-06T22:00:00Z')).toMatchObject({ level: 'R1', dueAt: '2027-03-07T02:00:00.000Z' });
  });

  test('closes by the clock of its own site', async () => {
    const site = await givenSite(scene.study, { timeZone: 'America/New_York' });
    const { actor } = await givenParticipant(site, scene.protocol, await givenStaff('site-coordinator', site));
    // 03:00 UTC on Thursday is still Wednesday evening there; Thursday 17:00 is 22:00 UTC in winter.
    expect(await report(actor, said(), '2027-03-04T03:00:00Z')).toMatchObject({ dueAt: '2027-03-04T22:00:00.000Z' });
  });

  test('sent twice under one key is one report', async () => {
    const participant = await person();
    const input = said();
    const first = await report(participant.actor, input);
    expect(await report(participant.actor, input, '2027-03-03T10:05:00Z')).toEqual(first);
    expect(await asOwner('select id from symptom_report where participant_id = $1', [participant.id])).toHaveLength(1);
  });

  test('a graver sign under a key that was used is another report, and its words come at once', async () => {
    const participant = await person();
    const mild = said();
    await report(participant.actor, mild);
    const grave = await report(participant.actor, { ...mild, signs: ['heavy', 'hot', 'red', 'fever'] }, '2027-03-03T10:05:00Z');
    expect(grave).toMatchObject({ level: 'R1', urgency: 'same-day care', holdTraining: true });
    expect(await asOwner('select level from symptom_report where participant_id = $1 order by reported_at', [participant.id])).toEqual([{ level: 'S1' }, { level: 'R1' }]);
  });

  test('of nothing, or of a day to come, is refused', async () => {
    const { actor } = await person();
    await expect(report(actor, said({ signs: [] }))).rejects.toMatchObject({ code: 'invalid', field: 'signs' });
    await expect(report(actor, said({ noticedOn: '2027-03-04' }))).rejects.toMatchObject({ code: 'invalid', field: 'noticedOn' });
    await expect(report(actor, said({ noticedOn: '1950-03-04' }))).rejects.toMatchObject({ code: 'invalid', field: 'noticedOn' });
  });

  test('comes from a participant only', async () => {
    await expect(report(scene.coordinator)).rejects.toMatchObject({ code: 'forbidden' });
    await expect(report(await givenStaff('monitor', scene.site))).rejects.toMatchObject({ code: 'forbidden' });
  });
});

describe('the site', () => {
  test('sees its open reports, the first due first, and those past their time', async () => {
    const one = await report((await person()).actor, said({ signs: ['lump'] }));
    const two = await report((await person()).actor, said({ signs: ['red'] }));
    const rows = await withWork(scene.coordinator, 'symptom.list', listOpenReports, at('2027-03-03T15:00:00Z'));
    const [urgent, later] = [rows.findIndex(({ id }) => id === two.id), rows.findIndex(({ id }) => id === one.id)];
    expect(urgent).toBeLessThan(later);
    expect(rows[urgent]).toMatchObject({ level: 'R1', isOverdue: true, said: 'Red or darker skin, or red streaks; longer than a day' });
    expect(rows[later]?.isOverdue).toBe(false);
    expect((await withWork(scene.otherCoordinator, 'symptom.list', listOpenReports, at(wednesday))).filter(({ id }) => id === one.id)).toEqual([]);
  });

  test('does not have soreness among what waits', async () => {
    const sore = await report((await person()).actor, said({ signs: [], soreness: { days: 2, onlyTrainedMuscles: true } }));
    expect((await withWork(scene.coordinator, 'symptom.list', listOpenReports)).map(({ id }) => id)).not.toContain(sore.id);
    expect((await withWork(scene.coordinator, 'symptom.list', (work) => listClosedReports(work))).map(({ id }) => id)).toContain(sore.id);
  });

  test('marks a report read when the coordinator opens it, once', async () => {
    const { id } = await report((await person()).actor);
    expect(await read(scene.coordinator, id, '2027-03-03T10:30:00Z')).toMatchObject({ state: 'read', readAt: '2027-03-03T10:30:00.000Z' });
    expect(await read(scene.coordinator, id, '2027-03-03T12:00:00Z')).toMatchObject({ readAt: '2027-03-03T10:30:00.000Z' });
  });

  test('a monitor reads a report and neither marks nor reviews it; another site does not see it', async () => {
    const { id } = await report((await person()).actor);
    const monitor = await givenStaff('monitor', scene.site);
    expect(await withWork(monitor, 'symptom.view', (work) => viewReport(work, { id }))).toMatchObject({ level: 'S1', signs: ['Heavier'] });
    await expect(read(monitor, id)).rejects.toMatchObject({ code: 'forbidden' });
    await expect(review(monitor, id)).rejects.toMatchObject({ code: 'forbidden' });
    await expect(read(scene.otherCoordinator, id)).rejects.toMatchObject({ code: 'not-found' });
    await expect(review(scene.otherCoordinator, id)).rejects.toMatchObject({ code: 'not-found' });
  });

  test('reviews once, and from the version it saw', async () => {
    const { id } = await report((await person()).actor);
    const { version } = await read(scene.coordinator, id);
    await expect(review(scene.coordinator, id, {}, undefined, version - 1)).rejects.toMatchObject({ code: 'stale' });
    expect(await review(scene.coordinator, id, {}, undefined, version)).toMatchObject({ state: 'reviewed', review: { outcome: 'advice' } });
    await expect(review(scene.coordinator, id)).rejects.toMatchObject({ code: 'conflict' });
  });
});

describe('training', () => {
  test('is held from the report until the review says advice or no action', async () => {
    const participant = await person();
    const { id } = await report(participant.actor);
    expect(await isHeld(participant)).toBe(true);
    await review(scene.coordinator, id, { outcome: 'no action' });
    expect(await isHeld(participant)).toBe(false);
  });

  test('is not held by soreness', async () => {
    const participant = await person();
    await report(participant.actor, said({ signs: [], soreness: { days: 2, onlyTrainedMuscles: true } }));
    expect(await isHeld(participant)).toBe(false);
  });

  test('stays held while a second report waits', async () => {
    const participant = await person();
    const { id } = await report(participant.actor);
    await report(participant.actor, said({ signs: ['lump'] }));
    await review(scene.coordinator, id);
    expect(await isHeld(participant)).toBe(true);
  });

  test.each(['unscheduled visit', 'adverse event'] as const)('after the outcome %s stays held until the next completed assessment', async (outcome) => {
    const participant = await person();
    const { id } = await report(participant.actor);
    await complete(participant, '2027-03-03T11:00:00Z');
    await review(scene.coordinator, id, { outcome, visitOn: '2027-03-08' });
    expect(await isHeld(participant)).toBe(true);
    await asOwner(`update limb_assessment set completed_at = '2027-03-08T11:00:00Z' where participant_id = $1`, [participant.id]);
    await setScene([scene.site.id], (work) => settleHold(work, participant.id));
    expect(await isHeld(participant)).toBe(false);
  });

  test('an unscheduled visit stands in the schedule at once, on its day and the week after', async () => {
    const participant = await person();
    const { id } = await report(participant.actor);
    await review(scene.coordinator, id, { outcome: 'unscheduled visit', visitOn: '2027-03-08', note: 'Measure both arms.' });
    expect(await asOwner(`select target_on::text, unscheduled_reason from visit where participant_id = $1 and unscheduled_reason is not null`, [participant.id])).toEqual([
      { target_on: '2027-03-08', unscheduled_reason: 'Symptom report: Measure both arms.' },
    ]);
  });

  test('an unscheduled visit without a day, or on a day gone by, is refused and nothing is reviewed', async () => {
    const { id } = await report((await person()).actor);
    await expect(review(scene.coordinator, id, { outcome: 'unscheduled visit' })).rejects.toMatchObject({ code: 'invalid', field: 'visitOn' });
    await expect(review(scene.coordinator, id, { outcome: 'unscheduled visit', visitOn: '2027-03-03' })).rejects.toMatchObject({ code: 'invalid', field: 'visitOn' });
    expect(await withWork(scene.coordinator, 'symptom.view', (work) => viewReport(work, { id }))).toMatchObject({ state: 'new' });
  });
});
