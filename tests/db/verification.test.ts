import { beforeAll, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { beginAssessment } from '@/lib/measurement/begin-assessment';
import { completeAssessment } from '@/lib/measurement/complete-assessment';
import { correctValue } from '@/lib/measurement/correct-value';
import { saveCircumstances } from '@/lib/measurement/save-circumstances';
import { saveTrial } from '@/lib/measurement/save-trial';
import type { CompleteAssessmentView } from '@/lib/measurement/view-complete';
import { raiseQuery } from '@/lib/queries/raise-query';
import { markVerified } from '@/lib/review/mark-verified';
import { viewReview } from '@/lib/review/view-review';
import { withWork } from '@/lib/work/with-work';
import type { Work } from '@/lib/work/work';
import { givenParticipant, givenScene, givenStaff, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
let assessor: Actor;
let monitor: Actor;
let who: GivenParticipant;
let saved: CompleteAssessmentView;
const left = [160, 172, 190, 212, 234, 251, 260, 264, 270, 282, 296];
const right = left.map((girth) => girth - 2);

beforeAll(async () => {
  scene = await givenScene();
  assessor = await givenStaff('assessor', scene.site);
  monitor = await givenStaff('monitor', [scene.site, scene.otherSite]);
  who = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
  saved = await measured(who);
});

async function measured({ visits }: GivenParticipant): Promise<CompleteAssessmentView> {
  let view = await withWork(assessor, 'assessment.begin', (work) => beginAssessment(work, { id: visits['baseline'] ?? '' }), { now: new Date('2027-01-08T10:00:00Z') });
  const step = async (run: (work: Work) => Promise<typeof view>) => {
    view = await withWork(assessor, 'assessment.save-trial', run, { expectedVersion: view.version });
  };
  const { id } = view;
  await step((work) => saveCircumstances(work, { id, position: 'hanging', sleeveWorn: false, hoursSinceTraining: 30, bodyWeightG: 71_400, impedanceRatio: 1.02, impedanceRestMin: 10, remarks: null }));
  for (const trial of [1, 2]) for (const [side, circumferencesMm] of [['left', left], ['right', right]] as const) await step((work) => saveTrial(work, { id, side, trial, circumferencesMm }));
  return withWork(assessor, 'assessment.complete', (work) => completeAssessment(work, { id, kept: [] }), { expectedVersion: view.version });
}

const visitId = () => saved.visitId;
const review = (actor = monitor) => withWork(actor, 'visit.view', (work) => viewReview(work, { visitId: visitId(), code: who.code }));
const trial = (side: 'left' | 'right', number: number) => saved.trialIds.find((one) => one.side === side && one.trial === number)?.id ?? '';

describe('a verification mark', () => {
  test('stands once on a value, however often it is pressed', async () => {
    const target = { table: 'limb_trial' as const, id: trial('left', 1), field: 'circumferences_mm.0', value: 160 };
    const press = () => withWork(monitor, 'verification.mark', (work) => markVerified(work, { targets: [target] }));
    expect(await press()).toEqual({ marked: 1 });
    expect(await press()).toEqual({ marked: 0 });
    expect((await review()).marks.filter(({ id, field }) => id === target.id && field === target.field)).toHaveLength(1);
  });

  test('does not land on a value other than the one on the screen', async () => {
    const target = { table: 'limb_trial' as const, id: trial('left', 1), field: 'circumferences_mm.1', value: 171 };
    await expect(withWork(monitor, 'verification.mark', (work) => markVerified(work, { targets: [target] }))).rejects.toMatchObject({ code: 'stale' });
  });

  test('falls with its own girth and leaves the neighbours standing', async () => {
    const id = trial('right', 2);
    const at = (level: number) => ({ table: 'limb_trial' as const, id, field: `circumferences_mm.${level}`, value: right[level] as number });
    await withWork(monitor, 'verification.mark', (work) => markVerified(work, { targets: [at(5), at(6)] }));
    const { assessment } = await review();
    const version = assessment?.trialIds.find((one) => one.id === id)?.version ?? 0;
    const reason = 'Read from the wrong mark.';
    const { value: _seen, ...target } = at(5);
    await withWork(assessor, 'assessment.correct', (work) => correctValue(work, { target, value: 252, reason }), { expectedVersion: version, reason });
    const after = await review();
    expect(after.marks.filter((mark) => mark.id === id).map(({ field }) => field)).toEqual(['circumferences_mm.6']);
    expect(after.struck).toEqual([expect.objectContaining({ field: 'circumferences_mm.5', value: right[5], replacedBy: 252, reason, label: assessor.label })]);
  });

  test('is the monitor’s alone, and of another site’s value does not exist', async () => {
    const target = { table: 'limb_assessment' as const, id: saved.id, field: 'body_weight_g', value: 71_400 };
    await expect(withWork(assessor, 'verification.mark', (work) => markVerified(work, { targets: [target] }))).rejects.toMatchObject({ code: 'forbidden' });
    const elsewhere = await givenStaff('monitor', scene.otherSite);
    await expect(withWork(elsewhere, 'verification.mark', (work) => markVerified(work, { targets: [target] }))).rejects.toMatchObject({ code: 'not-found' });
    await expect(withWork(monitor, 'assessment.correct', (work) => correctValue(work, { target, value: 70_000, reason: 'It looks wrong.' }))).rejects.toMatchObject({ code: 'forbidden' });
  });
});

describe('the review of a visit', () => {
  test('is out of reach from another site, and under another participant’s code', async () => {
    await expect(review(scene.otherCoordinator)).rejects.toMatchObject({ code: 'not-found' });
    const neighbour = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
    await expect(withWork(monitor, 'visit.view', (work) => viewReview(work, { visitId: visitId(), code: neighbour.code }))).rejects.toMatchObject({ code: 'not-found' });
  });

  test('holds nothing of an assessment that is still being taken', async () => {
    const other = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
    const open = await withWork(assessor, 'assessment.begin', (work) => beginAssessment(work, { id: other.visits['baseline'] ?? '' }), { now: new Date('2027-01-08T10:00:00Z') });
    await withWork(assessor, 'assessment.save-trial', (work) => saveTrial(work, { id: open.id, side: 'left', trial: 1, circumferencesMm: left }), { expectedVersion: open.version });
    const view = await withWork(assessor, 'visit.view', (work) => viewReview(work, { visitId: open.visitId, code: other.code }));
    expect(view).toMatchObject({ assessment: null, underWay: { passes: 1 }, struck: [] });
    expect(JSON.stringify(view)).not.toContain('296');
  });

  test('takes the same number of statements with one query in the margin as with many', async () => {
    const statements = (): Promise<number> =>
      withWork(monitor, 'visit.view', async (work) => {
        let count = 0;
        const counted: Work = { ...work, sql: (text, values) => ((count += 1), work.sql(text, values)) };
        await viewReview(counted, { visitId: visitId(), code: who.code });
        return count;
      });
    const before = await statements();
    for (let level = 0; level < 8; level += 1)
      await withWork(monitor, 'query.raise', (work) => raiseQuery(work, { target: { table: 'limb_trial', id: trial('left', 2), field: `circumferences_mm.${level}` }, question: 'What does the paper sheet say?' }));
    const after = await review();
    expect(after.queries.length).toBeGreaterThanOrEqual(8);
    expect(await statements()).toBe(before);
  });
});
