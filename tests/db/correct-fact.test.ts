import { beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { correctFact } from '@/lib/participants/correct-fact';
import { correctFactInput } from '@/lib/participants/input';
import { viewParticipant } from '@/lib/participants/view-participant';
import { raiseQuery } from '@/lib/queries/raise-query';
import { withWork } from '@/lib/work/with-work';
import { givenParticipant, givenScene, givenStaff, setScene, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
let monitor: Actor;
let who: GivenParticipant;
beforeAll(async () => {
  scene = await givenScene();
  monitor = await givenStaff('monitor', scene.site);
});
beforeEach(async () => {
  who = await givenParticipant(scene.site, scene.protocol, scene.coordinator, { affectedSide: 'left' });
});

const now = new Date('2027-05-01T10:00:00Z');
const reason = 'The operation note says otherwise.';
const correct = (change: Record<string, unknown>, actor = scene.coordinator, expectedVersion = 1) => {
  const input = correctFactInput.parse({ code: who.code, reason, ...change });
  return withWork(actor, 'participant.correct', (work) => correctFact(work, input), { reason, now, expectedVersion });
};
const view = () => withWork(scene.coordinator, 'participant.view', (work) => viewParticipant(work, { code: who.code }));

/** Baseline and week 12, three levels 4 cm apart; only the left arm is fuller at the second. */
async function twoSittings(): Promise<void> {
  const girths = { baseline: { left: '{200,220,240}', right: '{200,220,240}' }, 'week-12': { left: '{210,231,252}', right: '{200,220,240}' } };
  await setScene([who.siteId], async (work) => {
    for (const [key, on] of [['baseline', '2027-01-08'], ['week-12', '2027-03-31']] as const) {
      await work.sql(`update visit set state = 'complete', done_on = ? where id = ?`, [on, who.visits[key]]);
      const [made] = await work.sql<{ id: string }>(
        `insert into limb_assessment (site_id, participant_id, visit_id, assessor_id, measured_at, position, sleeve_worn, method, start_offset_mm, step_mm, level_count, tolerance_mm, state, left_volume_ml, right_volume_ml, verdicts, formula_version)
         values (?, ?, ?, ?, ?::timestamptz, 'hanging', false, 'frustum', 0, 40, 3, 5, 'complete', 1, 1, '{}', '1.0.0') returning id`,
        [who.siteId, who.id, who.visits[key], scene.coordinator.accountId, `${on}T10:00:00Z`],
      );
      for (const side of ['left', 'right'] as const)
        for (const trial of [1, 2])
          await work.sql(`insert into limb_trial (site_id, participant_id, assessment_id, side, trial, circumferences_mm, saved_at) values (?, ?, ?, ?, ?, ?::integer[], now())`, [who.siteId, who.id, made?.id, side, trial, girths[key][side]]);
    }
  });
}

describe('a fact of a participant', () => {
  test('is corrected with a reason, in the version that was seen', async () => {
    await correct({ field: 'surgery', value: 'mastectomy' });
    await expect(correct({ field: 'height_mm', value: '170' })).rejects.toMatchObject({ code: 'stale' });
    const { version } = await view();
    await correct({ field: 'height_mm', value: '170' }, scene.coordinator, version);
    expect((await view()).facts).toMatchObject({ surgery: 'mastectomy', heightMm: 1700 });
    const withoutReason = correctFactInput.parse({ code: who.code, field: 'surgery', value: 'breast-conserving', reason });
    await expect(withWork(scene.coordinator, 'participant.correct', (work) => correctFact(work, withoutReason), { now })).rejects.toMatchObject({ field: 'reason' });
  });

  test('keeps to the rules of the enrolment', async () => {
    for (const change of [{ field: 'affected_side', value: 'both' }, { field: 'height_mm', value: '1.7' }, { field: 'nodes_removed', value: '99' }, { field: 'age_years', value: 12 }, { field: 'cohort', value: 'x' }, { field: 'constructor', value: 'x' }])
      expect([change.field, correctFactInput.safeParse({ code: who.code, reason, ...change }).success]).toEqual([change.field, false]);
    await expect(correct({ field: 'surgery_on', value: '2027-05-02' })).rejects.toMatchObject({ code: 'invalid', field: 'value' });
  });

  test('that decides results has them computed anew', async () => {
    await twoSittings();
    await correct({ field: 'affected_side', value: 'right' });
    // Girths a twentieth larger hold 1.05² = 1.1025 times as much; seen from the other arm that is 1/1.1025.
    const changeOf = async () => (await view()).visits.find(({ key }) => key === 'week-12')?.rvc;
    expect(await changeOf()).toBeCloseTo(1 / 1.1025 - 1, 5);
    await correct({ field: 'affected_side', value: 'left' }, scene.coordinator, (await view()).version);
    expect(await changeOf()).toBeCloseTo(0.1025, 5);
  });

  test('answers the query that asked about it, and no other', async () => {
    const ask = (field: string) => withWork(monitor, 'query.raise', (work) => raiseQuery(work, { target: { table: 'participant', id: who.id, field }, question: 'What does the operation note say?' }), { now });
    const [surgery, height] = [await ask('surgery'), await ask('height_mm')];
    await expect(correct({ field: 'surgery', value: 'mastectomy', query: { id: height.id, version: height.version } })).rejects.toMatchObject({ code: 'invalid', field: 'query' });
    await correct({ field: 'surgery', value: 'mastectomy', query: { id: surgery.id, version: surgery.version } });
    expect((await view()).factQueries.map(({ target, state }) => [target.field, state])).toEqual([['surgery', 'answered'], ['height_mm', 'open']]);
  });

  test('is not corrected by a monitor, and of another site does not exist', async () => {
    await expect(correct({ field: 'surgery', value: 'mastectomy' }, monitor)).rejects.toMatchObject({ code: 'forbidden' });
    await expect(correct({ field: 'surgery', value: 'mastectomy' }, scene.otherCoordinator)).rejects.toMatchObject({ code: 'not-found' });
  });
});
