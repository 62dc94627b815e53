import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { checkArm } from '@/lib/safety/check-arm';
import { logSession } from '@/lib/safety/log-session';
import type { LoggedSetInput, LogSessionInput } from '@/lib/training/input';
import { listFlags, seeFlag } from '@/lib/training/list-flags';
import { viewArm } from '@/lib/training/view-arm';
import { viewLifting } from '@/lib/training/view-lifting';
import { viewLog } from '@/lib/training/view-log';
import { viewWeek } from '@/lib/training/view-week';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenParticipant, givenScene, givenStaff, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
beforeAll(async () => {
  scene = await givenScene();
});

/** A Wednesday morning at the site, in winter time. */
const at = (day: string, time = '10:00') => ({ now: new Date(`${day}T${time}:00Z`) });
const press = (typed: number, change: Partial<LoggedSetInput> = {}): LoggedSetInput => ({
  exercise: 'chest-press', equipment: 'dumbbell', basis: 'per hand', side: 'both', typed, unit: 'kg', repetitions: 10, setCount: 2, effort: 7, alreadyLifted: false, ...change,
});
const session = (on: string, sets: LoggedSetInput[], change: Partial<LogSessionInput> = {}): LogSessionInput => ({
  clientKey: randomUUID(), on, armCheck: 'the same', soreness: 'no', effort: null, note: null, sets, ...change,
});
const log = (actor: Actor, input: LogSessionInput, when = at(input.on)) => withWork(actor, 'training.log', (work) => logSession(work, input), when);

async function givenMeasured(change: { enrolledOn?: string } = {}): Promise<GivenParticipant> {
  const participant = await givenParticipant(scene.site, scene.protocol, scene.coordinator, change);
  await measure(participant, 'baseline', '2027-01-06T09:00:00Z');
  return participant;
}

/** Both arms measured and complete at a visit; `rvc` as a proportion. */
const measure = (participant: GivenParticipant, visit: string, measuredAt: string, rvc = 0) =>
  asOwner(
    `insert into limb_assessment (site_id, participant_id, visit_id, assessor_id, measured_at, position, sleeve_worn, method, start_offset_mm, step_mm, level_count, tolerance_mm, state,
       left_volume_ml, right_volume_ml, rvc, formula_version, completed_at)
     values ($1, $2, $3, $4, $5, 'seated', false, 'frustum', 0, 40, 11, 5, 'complete', 2000, 2000, $6, '1', $5)`,
    [participant.siteId, participant.id, participant.visits[visit], scene.coordinator.accountId, measuredAt, rvc],
  );
const flagsOf = (participant: GivenParticipant) =>
  asOwner<{ rule: string; state: string; detail: { load: number | null } }>('select rule, state, detail from training_flag where participant_id = $1 order by rule, raised_at', [participant.id]);
const setsOf = (participant: GivenParticipant) =>
  asOwner<{ typed: number; unit: string; g: number }>('select load_typed::float8 as typed, unit, load_g as g from training_set where participant_id = $1 order by load_g', [participant.id]);

describe('a session', () => {
  test('is kept as it was lifted, with the zone and the moment it was entered', async () => {
    const participant = await givenMeasured();
    const saved = await log(participant.actor, session('2027-01-13', [press(2), press(2, { exercise: 'seated-row', equipment: 'cable', basis: 'machine setting' })]));
    expect(saved).toMatchObject({ on: '2027-01-13', late: false, advice: [], report: null });
    const view = await withWork(participant.actor, 'lifting.view', viewLifting, at('2027-01-13'));
    expect(view.sessions).toMatchObject([{ on: '2027-01-13', sets: [{ name: 'Chest press', typed: 2, repetitions: 10, setCount: 2 }, { name: 'Seated row' }] }]);
  });

  test('sent twice under one key is one session', async () => {
    const participant = await givenMeasured();
    const input = session('2027-01-13', [press(2)]);
    const first = await log(participant.actor, input);
    expect(await log(participant.actor, input)).toEqual(first);
    expect(await setsOf(participant)).toHaveLength(1);
  });

  test('under a used key with other figures is refused, and the first stands', async () => {
    const participant = await givenMeasured();
    const input = session('2027-01-13', [press(2)]);
    await log(participant.actor, input);
    await expect(log(participant.actor, { ...input, sets: [press(3)] })).rejects.toMatchObject({ code: 'conflict' });
    for (const change of [{ armCheck: 'clearly fuller' }, { soreness: 'a lot' }, { note: 'The left felt tight.' }, { effort: 7 }] as const)
      await expect(log(participant.actor, { ...input, ...change })).rejects.toMatchObject({ code: 'conflict' });
    expect(await setsOf(participant)).toEqual([{ typed: 2, unit: 'kg', g: 2000 }]);
  });

  test('of a day to come is refused, by the clock of the site', async () => {
    const participant = await givenMeasured();
    await expect(log(participant.actor, session('2027-01-14', [press(2)]), at('2027-01-13', '23:59'))).rejects.toMatchObject({ code: 'invalid', field: 'on' });
    await expect(log(participant.actor, session('2027-01-14', [press(2)]), at('2027-01-14', '00:00'))).resolves.toMatchObject({ on: '2027-01-14' });
  });

  test('before joining is refused', async () => {
    const participant = await givenMeasured();
    await expect(log(participant.actor, session('2027-01-05', [press(2)]), at('2027-01-13'))).rejects.toMatchObject({ code: 'invalid', field: 'on' });
  });

  test('entered after the protocol’s 48 hours is marked late, and one minute earlier is not', async () => {
    const participant = await givenMeasured();
    expect((await log(participant.actor, session('2027-01-11', [press(2)]), at('2027-01-14', '00:00'))).late).toBe(false);
    expect((await log(participant.actor, session('2027-01-11', [press(2)]), at('2027-01-14', '00:01'))).late).toBe(true);
  });

  test('with an unknown exercise, equipment it is not done with, or a load over the limit is refused', async () => {
    const { actor } = await givenMeasured();
    await expect(log(actor, session('2027-01-13', [press(2, { exercise: 'cartwheel' })]))).rejects.toMatchObject({ code: 'invalid', field: 'sets.0.exercise' });
    await expect(log(actor, session('2027-01-13', [press(2, { exercise: 'leg-press' })]))).rejects.toMatchObject({ code: 'invalid', field: 'sets.0.equipment' });
    await expect(log(actor, session('2027-01-13', [press(151)]))).rejects.toMatchObject({ code: 'invalid', field: 'sets.0.typed' });
  });

  test('is logged by its participant only: no role of the site may, and no other record is in reach', async () => {
    const participant = await givenMeasured();
    const other = await givenMeasured();
    for (const role of ['site-coordinator', 'assessor', 'monitor', 'data-manager'] as const)
      await expect(log(await givenStaff(role, scene.site), session('2027-01-13', [press(2)]))).rejects.toMatchObject({ code: 'forbidden' });
    await log(participant.actor, session('2027-01-13', [press(2)]));
    expect((await withWork(other.actor, 'lifting.view', viewLifting, at('2027-01-13'))).sessionCount).toBe(0);
  });

  test('after leaving the training is refused', async () => {
    const participant = await givenMeasured();
    await asOwner(`update participant set state = 'withdrawn', left_on = '2027-01-10', left_grade = 'stops training' where id = $1`, [participant.id]);
    await expect(log(participant.actor, session('2027-01-13', [press(2)]))).rejects.toMatchObject({ code: 'locked' });
  });
});

describe('pounds', () => {
  // 1 lb = 0.45359237 kg exactly (international yard and pound agreement, 1959).
  test('keep what was typed, with whole grams beside it', async () => {
    const participant = await givenMeasured();
    await log(participant.actor, session('2027-01-13', [press(4, { unit: 'lb' }), press(11, { unit: 'lb', exercise: 'biceps-curl' })]));
    expect(await setsOf(participant)).toEqual([
      { typed: 4, unit: 'lb', g: 1814 },
      { typed: 11, unit: 'lb', g: 4990 },
    ]);
  });

  test('are judged by the exact conversion: 5 lb is over a start of 2 kg', async () => {
    const participant = await givenMeasured();
    await log(participant.actor, session('2027-01-13', [press(5, { unit: 'lb' })]));
    expect(await flagsOf(participant)).toMatchObject([{ rule: 'START_HIGH', detail: { load: 2.267962 } }]);
  });
});

describe('the rules', () => {
  test('judge a step from week to week, and say so in words without refusing the session', async () => {
    const participant = await givenMeasured();
    await log(participant.actor, session('2027-01-13', [press(2)]));
    const saved = await log(participant.actor, session('2027-01-20', [press(5)]));
    expect(saved.advice).toMatchObject([{ rule: 'STEP_OVER', contactSite: false }]);
    expect((await log(participant.actor, session('2027-01-27', [press(10)]))).advice).toMatchObject([{ rule: 'STEP_HARD', contactSite: true }]);
  });

  test('a late entry withdraws a flag that no longer stands and raises none twice', async () => {
    const participant = await givenMeasured();
    await log(participant.actor, session('2027-01-13', [press(2)]));
    await log(participant.actor, session('2027-01-27', [press(5)]));
    expect(await flagsOf(participant)).toMatchObject([{ rule: 'STEP_OVER', state: 'raised' }]);
    await log(participant.actor, session('2027-01-20', [press(3.5)]), at('2027-01-28'));
    expect(await flagsOf(participant)).toMatchObject([{ rule: 'STEP_OVER', state: 'withdrawn' }]);
  });

  test('a late entry raises a flag on a later session that was clean', async () => {
    const participant = await givenMeasured();
    await log(participant.actor, session('2027-01-13', [press(2)]));
    await log(participant.actor, session('2027-01-27', [press(4)]));
    expect(await flagsOf(participant)).toEqual([]);
    await log(participant.actor, session('2027-01-21', [press(1)]), at('2027-01-28'));
    expect(await flagsOf(participant)).toMatchObject([{ rule: 'STEP_OVER', state: 'raised', detail: { load: 4 } }]);
  });

  test('the first session before both arms were measured is flagged', async () => {
    const participant = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
    await log(participant.actor, session('2027-01-13', [press(2)]));
    expect(await flagsOf(participant)).toMatchObject([{ rule: 'BASELINE_MISSING' }]);
  });

  test('a band has levels, not kilograms', async () => {
    const participant = await givenMeasured();
    await log(participant.actor, session('2027-01-13', [press(2, { equipment: 'band' })]));
    await log(participant.actor, session('2027-01-20', [press(4, { equipment: 'band' })]));
    expect(await flagsOf(participant)).toMatchObject([{ rule: 'STEP_OVER', detail: { load: 4 } }]);
    expect(await setsOf(participant)).toMatchObject([{ g: 0 }, { g: 0 }]);
  });

  test('the site sees a flag once, safety first; a monitor reads and does not tick', async () => {
    const participant = await givenMeasured();
    await log(participant.actor, session('2027-01-13', [press(2)]));
    await log(participant.actor, session('2027-01-20', [press(8)]));
    const mine = (rows: Awaited<ReturnType<typeof listFlags>>) => rows.filter(({ participantId }) => participantId === participant.id);
    const [flag] = mine(await withWork(scene.coordinator, 'symptom.list', (work) => listFlags(work)));
    expect(flag).toMatchObject({ rule: 'STEP_HARD', exercise: 'Chest press', state: 'raised' });
    const id = flag?.id ?? '';
    await expect(withWork(await givenStaff('monitor', scene.site), 'flag.see', (work) => seeFlag(work, { id }))).rejects.toMatchObject({ code: 'forbidden' });
    await expect(withWork(scene.otherCoordinator, 'flag.see', (work) => seeFlag(work, { id }))).rejects.toMatchObject({ code: 'not-found' });
    expect(await withWork(scene.coordinator, 'flag.see', (work) => seeFlag(work, { id }))).toMatchObject({ state: 'seen' });
    expect(mine(await withWork(scene.coordinator, 'symptom.list', (work) => listFlags(work)))).toEqual([]);
  });
});

describe('the arm check', () => {
  test('of a changed arm sends one report with the session’s key, and the session is logged all the same', async () => {
    const participant = await givenMeasured();
    const input = session('2027-01-13', [press(2)], { armCheck: 'a little fuller' });
    const checked = await withWork(participant.actor, 'symptom.report', (work) => checkArm(work, { clientKey: input.clientKey, armCheck: 'a little fuller' }), at('2027-01-13'));
    expect(checked.report).toMatchObject({ level: 'S1', holdTraining: true, dueAt: '2027-01-14T17:00:00.000Z' });
    const logged = await log(participant.actor, input);
    expect(logged.report?.id).toBe(checked.report?.id);
    expect(logged.advice).toMatchObject([{ rule: 'ASSESSMENT_REQUIRED', contactSite: true }]);
    expect((await withWork(participant.actor, 'week.view', viewWeek, at('2027-01-13'))).trainingHeld).toBe(true);
  });

  test('that turns out worse is told again', async () => {
    const { actor } = await givenMeasured();
    const clientKey = randomUUID();
    const tell = (armCheck: 'a little fuller' | 'clearly fuller') => withWork(actor, 'symptom.report', (work) => checkArm(work, { clientKey, armCheck }), at('2027-01-13'));
    const first = await tell('a little fuller');
    expect((await tell('clearly fuller')).report?.id).not.toBe(first.report?.id);
    expect((await tell('a little fuller')).report?.id).toBe(first.report?.id);
  });

  test('that finds nothing, or is not sure, reports nothing', async () => {
    const { actor } = await givenMeasured();
    for (const armCheck of ['the same', 'not sure'] as const)
      expect(await withWork(actor, 'symptom.report', (work) => checkArm(work, { clientKey: randomUUID(), armCheck }))).toEqual({ report: null });
  });
});

describe('the participant’s pages', () => {
  test('the week offers the next session today and the rest after days of rest', async () => {
    const participant = await givenMeasured();
    const kinds = (view: Awaited<ReturnType<typeof viewWeek>>) => view.days.map(({ items }) => items.filter((item) => item.kind === 'session').map((item) => item.kind === 'session' && `${item.number} ${item.state}`).join());
    expect(kinds(await withWork(participant.actor, 'week.view', viewWeek, at('2027-01-12')))).toEqual(['', '1 now', '', '', '2 planned', '', '']);
    await log(participant.actor, session('2027-01-12', [press(2)]));
    const view = await withWork(participant.actor, 'week.view', viewWeek, at('2027-01-12'));
    expect(kinds(view)).toEqual(['', '1 logged', '', '', '2 planned', '', '']);
    expect(view).toMatchObject({ weekNumber: 2, sessionsLogged: 1, isTraining: true });
  });

  test('a visit that is not booked stands on the first day it can be done, not at the end of the week', async () => {
    const participant = await givenMeasured();
    const [visit] = await asOwner<{ opens_on: string }>(`select opens_on::text from visit where participant_id = $1 and state = 'to come' order by opens_on limit 1`, [participant.id]);
    const opensOn = visit?.opens_on ?? '';
    const view = await withWork(participant.actor, 'week.view', viewWeek, at(opensOn));
    expect(view.days.filter(({ items }) => items.some((item) => item.kind === 'visit' && item.isWindow)).map(({ on }) => on)).toEqual([opensOn]);
  });

  test('the log opens with the programme of the protocol and the number of the session', async () => {
    const participant = await givenMeasured();
    await log(participant.actor, session('2027-01-12', [press(2)]));
    const view = await withWork(participant.actor, 'lifting.view', viewLog, at('2027-01-14'));
    expect(view.exercises.map(({ code }) => code)).toEqual(scene.protocol.document.exercises);
    expect(view).toMatchObject({ sessionNumber: 2, baselineOn: '2027-01-06', affectedSide: 'left' });
  });

  test('the arm is drawn from completed measurements only', async () => {
    const participant = await givenMeasured();
    await measure(participant, 'week-12', '2027-03-31T09:00:00Z', 0.051);
    await asOwner(
      `insert into limb_assessment (site_id, participant_id, visit_id, assessor_id, measured_at, method, start_offset_mm, step_mm, level_count, tolerance_mm)
       values ($1, $2, $3, $4, '2027-07-07T09:00:00Z', 'frustum', 0, 40, 11, 5)`,
      [participant.siteId, participant.id, participant.visits['month-6'], scene.coordinator.accountId],
    );
    const { points, errorPercent } = await withWork(participant.actor, 'arm.view', viewArm, at('2027-07-08'));
    expect(points.map(({ on, changePercent }) => [on, Number(changePercent.toFixed(3))])).toEqual([['2027-01-06', 0], ['2027-03-31', 5.1]]);
    // 3.92 × 1.5 (the protocol's SEM): clinical.md 1.4, SDC = 1.96·2·SEM.
    expect(errorPercent).toBeCloseTo(5.88, 10);
  });
});
