import { beforeAll, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { exportTrail, trailCsv } from '@/lib/audit/export-trail';
import { listTrailInput, trailFilter } from '@/lib/audit/input';
import { listTrail } from '@/lib/audit/list-trail';
import { viewProof } from '@/lib/audit/view-proof';
import { sealTrail } from '@/lib/audit/seal-trail';
import { systemActor } from '@/lib/auth/roles';
import { withWork } from '@/lib/work/with-work';
import { givenParticipant, givenScene, givenStaff, setScene, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
let monitor: Actor;
let auditor: Actor;
let participant: GivenParticipant;
let other: GivenParticipant;

beforeAll(async () => {
  scene = await givenScene();
  const { site, otherSite, protocol, coordinator, otherCoordinator } = scene;
  monitor = await givenStaff('monitor', site, 'M-01');
  auditor = await givenStaff('auditor', [site, otherSite], 'U-01');
  participant = await givenParticipant(site, protocol, coordinator);
  other = await givenParticipant(otherSite, protocol, otherCoordinator);
  const assessment = await setScene([site.id], async (work) => {
    await work.sql(`update visit set state = 'complete', done_on = '2027-01-06' where id = ?`, [participant.visits['baseline']]);
    const [row] = await work.sql<{ id: string }>(
      `insert into limb_assessment (site_id, participant_id, visit_id, measured_at, assessor_id, position, sleeve_worn, method, start_offset_mm, step_mm, level_count, tolerance_mm, state, body_weight_g, left_volume_ml, right_volume_ml, formula_version)
       values (?, ?, ?, '2027-01-06T10:00:00Z', ?, 'seated', false, 'frustum', 0, 40, 3, 5, 'complete', 74100, 2000, 2000, '1') returning id`,
      [site.id, participant.id, participant.visits['baseline'], coordinator.accountId],
    );
    await work.sql(
      `insert into limb_trial (site_id, participant_id, assessment_id, side, trial, circumferences_mm, saved_at) values (?, ?, ?, 'left', 2, '{160,180,274}', '2027-01-06T10:05:00Z')`,
      [site.id, participant.id, row?.id],
    );
    return row?.id;
  });
  await withWork(
    coordinator,
    'assessment.correct',
    async (work) => {
      await work.sql(`update limb_trial set circumferences_mm = '{160,180,259}', version = version + 1 where assessment_id = ?`, [assessment]);
      await work.sql(`update limb_assessment set body_weight_g = 71400, version = version + 1 where id = ?`, [assessment]);
    },
    { reason: '=Digits changed places when copied.' },
  );
});

const list = (actor: Actor, asked: Record<string, unknown> = {}) => withWork(actor, 'audit.list', (work) => listTrail(work, listTrailInput.parse(asked)));

test('a correction reads as what it was, what it is, why, by whom, at which visit', async () => {
  const { entries, found } = await list(monitor, { act: 'assessment.correct' });
  expect(found).toBe(2);
  const [weight, girth] = entries;
  expect(weight).toMatchObject({ who: scene.coordinator.label, did: 'corrected', code: participant.code, subject: 'Baseline, limb assessment', reason: '=Digits changed places when copied.' });
  expect(weight?.changes).toEqual([{ column: 'body_weight_g', label: 'body weight', kind: 'weight', before: 74100, after: 71400 }]);
  expect(girth).toMatchObject({ subject: 'Baseline, limb trial, left, trial 2' });
  expect(girth?.changes).toEqual([{ column: 'circumferences_mm.2', label: 'girth at level 3', kind: 'length', before: 274, after: 259 }]);
});

test('rows of another site never appear, and identity data never does', async () => {
  const mine = await list(monitor, { limit: 500 });
  expect(mine.entries.some(({ code }) => code === participant.code)).toBe(true);
  expect(mine.entries.some(({ code }) => code === other.code)).toBe(false);
  expect((await list(monitor, { code: other.code })).entries).toEqual([]);
  const everything = await list(auditor, { limit: 500 });
  expect(everything.entries.some(({ code }) => code === other.code)).toBe(true);
  expect(everything.entries.filter(({ table }) => table === 'participant_identity' || table === 'credential')).toEqual([]);
  expect(JSON.stringify(everything)).not.toContain('Ada Example');
});

test('pages by keyset meet without a gap or a repeat', async () => {
  const whole = (await list(auditor, { limit: 500 })).entries.map(({ id }) => id);
  const paged: string[] = [];
  for (let before: string | undefined, turn = 0; turn < 100; turn += 1) {
    const page = await list(auditor, { limit: 7, ...(before ? { before } : {}) });
    paged.push(...page.entries.map(({ id }) => id));
    if (page.nextBefore === null) break;
    before = page.nextBefore;
  }
  expect(paged).toEqual(whole.slice(0, paged.length));
  expect(paged.length).toBe(whole.length);
});

test('the sentence narrows by person, column and day', async () => {
  expect((await list(monitor, { who: scene.coordinator.label.toLowerCase() })).entries.every(({ who }) => who === scene.coordinator.label)).toBe(true);
  expect((await list(monitor, { field: 'body_weight_g', act: 'assessment.correct' })).entries).toHaveLength(1);
  expect((await list(monitor, { to: '2020-01-01' })).entries).toEqual([]);
});

test('the proof says how far the trail is sealed', async () => {
  const before = await withWork(auditor, 'audit.list', viewProof);
  expect(before.seal).toBeNull();
  await withWork(systemActor([scene.site.id, scene.otherSite.id]), 'job.seal', sealTrail);
  const after = await withWork(auditor, 'audit.list', viewProof);
  expect(after.isSound).toBe(true);
  expect(after.seal?.treeSize).toBeGreaterThan(0);
  const [last] = (await list(monitor, { act: 'assessment.correct' })).entries;
  expect(last?.isSealed).toBe(true);
});

test('the file holds one line a field, a formula is plain text, and taking it is in the trail', async () => {
  const taken = await withWork(auditor, 'audit.export', (work) => exportTrail(work, trailFilter.parse({ act: 'assessment.correct' })));
  const text = await new Response(trailCsv(taken)).text();
  const lines = text.trim().split(/\r?\n/);
  expect(lines).toHaveLength(3);
  expect(text).toContain(`"'=Digits changed places when copied."`);
  expect((await list(auditor, { act: 'audit.export' })).entries).toHaveLength(1);
  await expect(withWork(monitor, 'audit.export', (work) => exportTrail(work, trailFilter.parse({})))).rejects.toMatchObject({ code: 'forbidden' });
});
