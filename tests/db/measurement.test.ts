import { beforeAll, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/auth/roles';
import { beginAssessment } from '@/lib/measurement/begin-assessment';
import { completeAssessment } from '@/lib/measurement/complete-assessment';
import { correctValue } from '@/lib/measurement/correct-value';
import { saveCircumstances } from '@/lib/measurement/save-circumstances';
import { saveTrial } from '@/lib/measurement/save-trial';
import type { OpenAssessmentView } from '@/lib/measurement/view-open';
import { viewAssessment } from '@/lib/measurement/view-assessment';
import { listQueries } from '@/lib/queries/list-queries';
import { listQueriesInput } from '@/lib/queries/input';
import { fieldHistory } from '@/lib/review/field-history';
import { markVerified } from '@/lib/review/mark-verified';
import { marksOfVisit } from '@/lib/review/marks-of-visit';
import { withWork } from '@/lib/work/with-work';
import { asOwner, givenParticipant, givenScene, givenStaff, type GivenParticipant, type GivenScene } from '../given';

let scene: GivenScene;
let assessor: Actor;
let monitor: Actor;
beforeAll(async () => {
  scene = await givenScene();
  assessor = await givenStaff('assessor', scene.site);
  monitor = await givenStaff('monitor', [scene.site, scene.otherSite]);
});

/** The arm of the worked example VOL-03 (clinical checks): 1828.202 mL by frusta of 4 cm. */
const vol03 = [160, 172, 190, 212, 234, 251, 260, 264, 270, 282, 296];
/** The same with 3 mm more at every level, worked example VOL-10: 1873.619 mL. */
const vol10 = vol03.map((girth) => girth + 3);
const levels = (girths: readonly number[], count: number) => girths.slice(0, count);

const visitOf = (who: GivenParticipant, key: string): string => {
  const id = who.visits[key];
  if (!id) throw new Error(`No visit ${key}`);
  return id;
};

async function measure(who: GivenParticipant, visitKey: string, arms: { left: readonly number[]; right: readonly number[] }, on = '2027-01-08', bodyWeightG = 71_400): Promise<OpenAssessmentView> {
  let view = await withWork(assessor, 'assessment.begin', (work) => beginAssessment(work, { id: visitOf(who, visitKey) }), { now: new Date(`${on}T10:00:00Z`) });
  const about = { id: view.id, position: 'hanging' as const, sleeveWorn: false, hoursSinceTraining: 30, bodyWeightG, impedanceRatio: 1.02, impedanceRestMin: 10, remarks: null };
  view = await withWork(assessor, 'assessment.save-trial', (work) => saveCircumstances(work, about), { expectedVersion: view.version });
  for (const trial of [1, 2])
    for (const side of ['left', 'right'] as const) {
      const circumferencesMm = [...levels(arms[side], view.map.levelCount)];
      view = await withWork(assessor, 'assessment.save-trial', (work) => saveTrial(work, { id: view.id, side, trial, circumferencesMm }), { expectedVersion: view.version });
    }
  return view;
}

type Kept = { check: string; place: string; reason: string };
/** In most of these tests one arm stands for both. */
const sameArms: Kept[] = [{ check: 'arms.identical', place: 'whole', reason: 'Both arms read again, the same.' }];
const complete = (view: OpenAssessmentView, kept: Kept[] = sameArms) =>
  withWork(assessor, 'assessment.complete', (work) => completeAssessment(work, { id: view.id, kept }), { expectedVersion: view.version });

describe('a limb assessment', () => {
  test('computes the worked examples and the change against the baseline', async () => {
    const who = await givenParticipant(scene.site, scene.protocol, scene.coordinator, { enrolledOn: '2027-01-06', affectedSide: 'left' });
    const baseline = await complete(await measure(who, 'baseline', { left: vol03, right: vol03 }));
    const count = baseline.map.levelCount;
    expect(baseline.leftVolumeMl).toBeCloseTo(frusta(levels(vol03, count)), 2);
    expect(baseline.rvc).toBeNull();
    const keys = Object.keys(who.visits).filter((key) => key !== 'baseline');
    const later = await complete(await measure(who, keys[0] as string, { left: vol10, right: vol03 }, '2027-04-01'));
    expect(later.rvc).toBeCloseTo(frusta(levels(vol10, count)) / frusta(levels(vol03, count)) - 1, 5);
    expect(later.earlier.map(({ isBaseline }) => isBaseline)).toContain(true);
  });

  test('shows nothing of earlier visits, and no volume, while it is being taken', async () => {
    const who = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
    await complete(await measure(who, 'baseline', { left: vol03, right: vol03 }));
    const next = Object.keys(who.visits).find((key) => key !== 'baseline') as string;
    await measure(who, next, { left: vol10, right: vol03 }, '2027-04-01');
    const open = await withWork(assessor, 'assessment.view', (work) => viewAssessment(work, { visitId: visitOf(who, next) }));
    expect(open?.state).toBe('open');
    expect(JSON.stringify(open)).not.toMatch(/volume|rvc|earlier|verdict|baseline|interLimb/i);
  });

  test('is the site’s alone while it is being taken: a monitor reads, marks and asks only about what was saved', async () => {
    const who = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
    const open = await measure(who, 'baseline', { left: vol03, right: vol03 });
    const target = { table: 'limb_assessment', id: open.id, field: 'body_weight_g' } as const;
    const history = (actor: Actor) => withWork(actor, 'history.view', (work) => fieldHistory(work, target));
    expect((await history(assessor)).map(({ value }) => value)).toEqual([71_400]);
    await expect(history(monitor)).rejects.toMatchObject({ code: 'not-found' });
    await expect(withWork(monitor, 'verification.mark', (work) => markVerified(work, { targets: [{ ...target, value: 71_400 }] }))).rejects.toMatchObject({ code: 'not-found' });
    expect(await withWork(monitor, 'assessment.view', (work) => viewAssessment(work, { visitId: open.visitId }))).toBeNull();
    await complete(open);
    expect((await history(monitor)).map(({ value }) => value)).toEqual([71_400]);
    expect(await withWork(monitor, 'assessment.view', (work) => viewAssessment(work, { visitId: open.visitId }))).toMatchObject({ state: 'complete' });
  });

  test('mends both trials of a level at once, or takes the third reading of the source, and is no dead end', async () => {
    const who = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
    const saved = await complete(await measure(who, 'baseline', { left: vol03, right: vol03 }));
    const [first] = await asOwner<{ id: string; version: number; circumferences_mm: number[] }>(`select id, version, circumferences_mm from limb_trial where assessment_id = $1 and side = 'left' and trial = 1`, [saved.id]);
    const before = first?.circumferences_mm[2] ?? 0;
    const reason = 'Copied from the line below.';
    const correct = (value: number, also?: { other?: number; third?: number }, version = first?.version ?? 0) =>
      withWork(assessor, 'assessment.correct', (work) => correctValue(work, { target: { table: 'limb_trial', id: first?.id ?? '', field: 'circumferences_mm.2' }, value, reason, ...(also ? { also } : {}) }), { expectedVersion: version, reason });
    const readings = () => asOwner<{ trial: number; mm: number | null }>(`select trial, circumferences_mm[3] as mm from limb_trial where assessment_id = $1 and side = 'left' order by trial`, [saved.id]);
    await expect(correct(before - 20)).rejects.toMatchObject({ code: 'invalid', field: 'also', message: expect.stringContaining('apart') as string });
    await correct(before - 20, { other: before - 19 });
    expect(await readings()).toEqual([{ trial: 1, mm: before - 20 }, { trial: 2, mm: before - 19 }]);
    await correct(before, { third: before - 1 }, (first?.version ?? 0) + 1);
    expect(await readings()).toEqual([{ trial: 1, mm: before }, { trial: 2, mm: before - 19 }, { trial: 3, mm: before - 1 }]);
  });

  test('corrects a value with a reason: results follow, the mark falls, the history keeps the old value', async () => {
    const who = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
    const saved = await complete(await measure(who, 'baseline', { left: vol03, right: vol03 }));
    const target = { table: 'limb_assessment', id: saved.id, field: 'body_weight_g' } as const;
    await withWork(monitor, 'verification.mark', (work) => markVerified(work, { targets: [{ ...target, value: 71_400 }] }));
    const marks = () => withWork(monitor, 'visit.view', (work) => marksOfVisit(work, saved.visitId));
    expect(await marks()).toHaveLength(1);
    const correction = { target, value: 74_100, reason: 'Digits changed places when copied.' };
    await expect(withWork(assessor, 'assessment.correct', (work) => correctValue(work, correction), { expectedVersion: saved.version })).rejects.toMatchObject({ field: 'reason' });
    await withWork(assessor, 'assessment.correct', (work) => correctValue(work, correction), { expectedVersion: saved.version, reason: correction.reason });
    expect(await marks()).toEqual([]);
    const history = await withWork(monitor, 'history.view', (work) => fieldHistory(work, target));
    expect(history.map(({ value, reason }) => [value, reason])).toEqual([
      [71_400, null],
      [74_100, correction.reason],
    ]);
    await expect(
      withWork(assessor, 'assessment.correct', (work) => correctValue(work, { ...correction, value: 70_000 }), { expectedVersion: saved.version, reason: 'Again and again.' }),
    ).rejects.toMatchObject({ code: 'stale' });
  });

  test('needs a third reading where two trials differ, and a reason for what cannot be right', async () => {
    const who = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
    let view = await measure(who, 'baseline', { left: vol03, right: vol03 });
    const apart = levels(vol03, view.map.levelCount).map((girth, level) => (level === 1 ? girth + 9 : girth));
    view = await withWork(assessor, 'assessment.save-trial', (work) => saveTrial(work, { id: view.id, side: 'left', trial: 2, circumferencesMm: apart }), { expectedVersion: view.version });
    await expect(complete(view)).rejects.toMatchObject({ code: 'invalid', field: 'left 3 1' });
  });

  test('pressed twice is saved once', async () => {
    const who = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
    const view = await measure(who, 'baseline', { left: vol03, right: vol03 });
    const answers = await Promise.allSettled([complete(view), complete(view)]);
    expect(answers.map(({ status }) => status).toSorted()).toEqual(['fulfilled', 'rejected']);
    const { rows } = await withWork(monitor, 'query.list', (work) => listQueries(work, listQueriesInput.parse({ pageSize: 100 })));
    // The doubt was kept with a reason: it stands in the margin and asks nothing.
    expect(rows.filter(({ participantCode }) => participantCode === who.code)).toEqual([]);
  });

  test('of another site does not exist, and a monitor does not measure', async () => {
    const who = await givenParticipant(scene.site, scene.protocol, scene.coordinator);
    const view = await measure(who, 'baseline', { left: vol03, right: vol03 });
    const stranger = await givenStaff('assessor', scene.otherSite);
    await expect(withWork(stranger, 'assessment.view', (work) => viewAssessment(work, { visitId: view.visitId }))).rejects.toMatchObject({ code: 'not-found' });
    await expect(withWork(monitor, 'assessment.complete', (work) => completeAssessment(work, { id: view.id, kept: [] }))).rejects.toMatchObject({ code: 'forbidden' });
  });

});

/** The truncated-cone formula, written out by hand: sum of h (C1² + C1 C2 + C2²) / 12π, cm in, mL out. */
function frusta(girthsMm: readonly number[]): number {
  const cm = girthsMm.map((mm) => mm / 10);
  return cm.slice(1).reduce((sum, upper, index) => sum + (4 * ((cm[index] as number) ** 2 + (cm[index] as number) * upper + upper ** 2)) / (12 * Math.PI), 0);
}
