import { beforeAll, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { listParticipantsInput } from '@/lib/participants/input';
import { listParticipants } from '@/lib/participants/list-participants';
import { revealIdentity } from '@/lib/participants/reveal-identity';
import { viewParticipant } from '@/lib/participants/view-participant';
import { withWork } from '@/lib/work/with-work';
import { countStatements } from '../count-statements';
import { asOwner, givenParticipant, givenScene, givenStaff, setScene, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
let monitor: Actor;
let own: GivenParticipant[];
let other: GivenParticipant;

beforeAll(async () => {
  scene = await givenScene({ swelling: { primary: 'D6', alternatives: ['D5'], earlyExclusionDays: 90, impedanceCutoffs: '2011-3sd' } });
  const { site, otherSite, protocol, coordinator, otherCoordinator } = scene;
  monitor = await givenStaff('monitor', [site, otherSite]);
  own = [];
  for (const [enrolledOn, cohort] of [['2027-01-06', 'at-risk'], ['2027-01-04', 'living-with'], ['2027-01-05', 'at-risk']] as const)
    own.push(await givenParticipant(site, protocol, coordinator, { enrolledOn, cohort }));
  other = await givenParticipant(otherSite, protocol, otherCoordinator);
  const [swollen] = own;
  if (!swollen) throw new Error('The scene has participants.');
  await setScene([site.id], async (work) => {
    await work.sql(`update visit set state = 'complete', done_on = '2027-03-31' where id = ?`, [swollen.visits['week-12']]);
    await work.sql(
      `insert into limb_assessment (site_id, participant_id, visit_id, measured_at, assessor_id, position, sleeve_worn, method, start_offset_mm, step_mm, level_count, tolerance_mm, state, left_volume_ml, right_volume_ml, rvc, verdicts, formula_version)
       values (?, ?, ?, '2027-03-31T10:00:00Z', ?, 'seated', false, 'frustum', 0, 40, 11, 5, 'complete', 2310, 2100, 0.1, '{"D6":{"verdict":"met"}}'::jsonb, '1')`,
      [site.id, swollen.id, swollen.visits['week-12'], scene.coordinator.accountId],
    );
  });
});

const list = (actor: Actor, asked: Record<string, unknown> = {}) => withWork(actor, 'participant.list', (work) => listParticipants(work, listParticipantsInput.parse(asked)));
const codes = async (actor: Actor, asked: Record<string, unknown> = {}) => (await list(actor, asked)).rows.map(({ code }) => code);

test('a coordinator lists the own site only, a monitor every site assigned', async () => {
  expect(await codes(scene.coordinator)).toEqual(own.map(({ code }) => code).sort());
  expect(new Set(await codes(monitor))).toEqual(new Set([...own, other].map(({ code }) => code)));
  expect(await codes(scene.coordinator, { siteId: scene.otherSite.id })).toEqual([]);
});

test('the list sorts by a column of the closed list and pages without a gap', async () => {
  const byDay = [own[1], own[2], own[0]].map((participant) => participant?.code);
  expect(await codes(scene.coordinator, { sort: 'enrolledOn' })).toEqual(byDay);
  expect(await codes(scene.coordinator, { sort: 'enrolledOn', direction: 'desc' })).toEqual([...byDay].reverse());
  expect(listParticipantsInput.safeParse({ sort: 'name; drop table participant' }).success).toBe(false);
  for (let count = 0; count < 4; count += 1) await givenParticipant(scene.site, scene.protocol, scene.coordinator);
  const whole = await codes(scene.coordinator, { pageSize: 100 });
  const first = await list(scene.coordinator, { pageSize: 5 });
  const second = await list(scene.coordinator, { pageSize: 5, page: 1 });
  expect(first.rowCount).toBe(7);
  expect([...first.rows, ...second.rows].map(({ code }) => code)).toEqual(whole);
});

test('a percent sign and an underscore in the search stand for themselves', async () => {
  expect(await codes(scene.coordinator, { q: '%' })).toEqual([]);
  expect(await codes(scene.coordinator, { q: '_' })).toEqual([]);
  expect(await codes(scene.coordinator, { q: own[0]?.code.toLowerCase() })).toEqual([own[0]?.code]);
});

test('cohort and swelling by the primary definition narrow the list', async () => {
  expect(await codes(scene.coordinator, { cohort: 'living-with' })).toEqual([own[1]?.code]);
  const swollen = await list(scene.coordinator, { swelling: 'met' });
  expect(swollen.rows.map(({ code, change, verdict }) => [code, change, verdict])).toEqual([[own[0]?.code, 0.1, 'met']]);
});

test('the statements are the same for few and for many participants', async () => {
  const count = (actor: Actor, pageSize: number) =>
    withWork(actor, 'participant.list', async (work) => (await countStatements(work, (counted) => listParticipants(counted, listParticipantsInput.parse({ pageSize, sort: 'change' })))).statements);
  expect(await count(scene.coordinator, 5)).toBe(await count(monitor, 100));
});

test('a participant page of another site does not exist', async () => {
  const code = own[0]?.code ?? '';
  const view = await withWork(scene.coordinator, 'participant.view', (work) => viewParticipant(work, { code }));
  expect(view.visits.map(({ key }) => key)).toEqual(['baseline', 'week-12', 'month-6']);
  expect(view.visits.find(({ key }) => key === 'week-12')).toMatchObject({ rvc: 0.1, deltaDays: 0 });
  await expect(withWork(scene.otherCoordinator, 'participant.view', (work) => viewParticipant(work, { code }))).rejects.toMatchObject({ code: 'not-found' });
});

test('name and contact are for the own coordinator, and the reading is in the trail; a monitor never gets them', async () => {
  const [participant] = own;
  const code = participant?.code ?? '';
  const identity = await withWork(scene.coordinator, 'identity.view', (work) => revealIdentity(work, { code }));
  expect(identity.name).toMatch(/^Ada Example/);
  const read = await asOwner<{ actor_id: string }>(`select actor_id from audit_entry where act = 'identity.view' and op = 'EVENT' and participant_id = $1`, [participant?.id]);
  expect(read).toEqual([{ actor_id: scene.coordinator.accountId }]);
  await expect(withWork(monitor, 'identity.view', (work) => revealIdentity(work, { code }))).rejects.toMatchObject({ code: 'forbidden' });
  await expect(withWork(scene.otherCoordinator, 'identity.view', (work) => revealIdentity(work, { code }))).rejects.toMatchObject({ code: 'not-found' });
  const seen = await withWork(monitor, 'participant.view', async (work) => ({
    view: await viewParticipant(work, { code }),
    rows: await work.sql('select * from participant_identity'),
  }));
  expect(JSON.stringify(seen.view)).not.toContain(identity.name);
  expect(seen.rows).toEqual([]);
});
