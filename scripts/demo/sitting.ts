import { daysBetween, type LocalDate } from '@/instruments/calendar';
import { checkLimbSitting } from '@/instruments/checks/limb-sitting';
import { combineTrials } from '@/instruments/measurement/combine-trials';
import { computeAssessment, type ComputedAssessment, type MeasuredSitting, type TrialReading } from '@/lib/measurement/compute-assessment';
import { placeName } from '@/lib/measurement/findings';
import { type Arms, daysError, type Hand, readTrial, type Side } from './arm';
import { minutesAfter } from './clock';
import type { Draw } from './draw';
import { type DemoEvent, eventBy, inserted, type Row, updated } from './events';
import type { Person } from './person';
import type { Plan, Staff } from './plan';
import type { PlannedVisit } from './visit-plan';

/** A value first put down wrong, and put right later. */
export type Slip =
  | { readonly kind: 'weight'; readonly wrongG: number }
  | { readonly kind: 'trial'; readonly trialId: string; readonly side: Side; readonly trial: number; readonly level: number; readonly wrongMm: number; readonly rightMm: number };

/** One sitting as recorded. `sitting` is right; `asEntered` may hold a slip. */
export interface Sitting {
  readonly visit: PlannedVisit;
  readonly assessmentId: string;
  readonly at: Date;
  readonly day: number;
  readonly trialIds: ReadonlyMap<string, string>;
  readonly asEntered: MeasuredSitting;
  readonly sitting: MeasuredSitting;
  readonly enteredResult: ComputedAssessment;
  readonly result: ComputedAssessment;
  readonly slip: Slip | null;
  readonly sleeveWorn: boolean;
  readonly hoursSinceTraining: number | null;
  readonly restMin: number | null;
  readonly remarks: string | null;
  readonly assessor: Staff;
}

interface Scene {
  readonly plan: Plan;
  readonly person: Person;
  readonly arms: Arms;
  readonly ids: Draw;
  readonly draw: Draw;
}

const sides: readonly Side[] = ['left', 'right'];
const remarks = ['Carried shopping the day before.', 'Skin dry at the elbow, no break.', 'Watch moved to the other wrist since the last visit.', 'Marks drawn afresh.', 'Says the arm feels as usual.'];

function readBothArms(draw: Draw, trueMm: Record<Side, number[]>, hand: Hand, toleranceMm: number): TrialReading[] {
  const trials = sides.flatMap((side) => {
    const dayError = daysError(draw, hand);
    return [1, 2].map((trial) => ({ side, trial, circumferencesMm: readTrial(draw, trueMm[side], dayError, hand) }));
  });
  return [...trials, ...sides.flatMap((side) => thirdTrial(draw, trials, side, trueMm[side], toleranceMm))];
}

/** A third reading, only at the levels where the first two disagree by more than the tolerance. */
function thirdTrial(draw: Draw, trials: readonly TrialReading[], side: Side, trueMm: readonly number[], toleranceMm: number): TrialReading[] {
  const pass = (trial: number): readonly (number | null)[] => trials.find((candidate) => candidate.side === side && candidate.trial === trial)?.circumferencesMm ?? [];
  const [first, second] = [pass(1), pass(2)];
  const third = first.map((girth, level) => {
    const { thirdNeeded } = combineTrials({ first: girth, second: second[level] ?? null }, toleranceMm);
    return thirdNeeded ? Math.round((trueMm[level] ?? 0) + draw.normal(0, 1.2)) : null;
  });
  return third.some((girth) => girth !== null) ? [{ side, trial: 3, circumferencesMm: third }] : [];
}

/** Measures both arms at a visit. `baseline` is null at the baseline; `lastTrainingOn` the last session before. */
export function measure(scene: Scene, visit: PlannedVisit & { outcome: { on: LocalDate; minutes: number } }, baseline: MeasuredSitting | null, lastTrainingOn: LocalDate | null): Sitting {
  const { plan, person, arms, ids, draw } = scene;
  const { measurement, swelling } = plan.protocol;
  const { on } = visit.outcome;
  const day = daysBetween({ from: person.enrolledOn, to: on });
  const hand = { roundedShare: person.site.roundedShare, noise: person.cast?.course ? 0.35 : 1 };
  const trueMm = { left: arms.trueGirthsMm('left', day), right: arms.trueGirthsMm('right', day) };
  const ratio = Math.round(arms.impedanceRatio(day, draw) * 1000) / 1000;
  const isStory = Boolean(person.cast?.course) && visit.key === 'month-6';
  const right: MeasuredSitting = {
    on, method: measurement.method, toleranceMm: measurement.toleranceMm,
    map: { startOffsetMm: measurement.startOffsetMm, stepMm: measurement.stepMm, levels: measurement.levelCount },
    trials: [...readBothArms(draw, trueMm, hand, measurement.toleranceMm), ...(isStory ? storyThird(trueMm.left) : [])],
    bodyWeightG: Math.round(arms.weightKg(day) * 10) * 100,
    impedanceRatio: draw.chance(0.04) && !person.cast ? null : ratio,
  };
  const trialIds = new Map([...sides.flatMap((side) => [1, 2, 3].map((trial) => [`${side} ${trial}`, ids.uuid()] as const))]);
  const slip = person.cast?.course ? (isStory ? trialSlip(right, trialIds, { side: 'left', trial: 2, level: storyLevel, byMm: 17 }) : null) : inventSlip(draw, right, trialIds, baseline !== null);
  const asEntered = slip ? withSlip(right, slip) : right;
  const settings = { earlyExclusionDays: swelling.earlyExclusionDays, impedanceCutoffs: swelling.impedanceCutoffs };
  const compute = (sitting: MeasuredSitting): ComputedAssessment => computeAssessment({ sitting, arms: person.facts, baseline, settings });
  return {
    visit, day, assessmentId: ids.uuid(), at: plan.clock.at(on, visit.outcome.minutes + 6, person.site.timeZone), trialIds, asEntered, sitting: right, slip,
    enteredResult: compute(asEntered), result: compute(right),
    sleeveWorn: draw.chance(0.05),
    hoursSinceTraining: lastTrainingOn === null ? null : Math.min(999, Math.max(3, daysBetween({ from: lastTrainingOn, to: on }) * 24 - draw.whole(2, 9))),
    restMin: right.impedanceRatio === null ? null : 10,
    remarks: draw.chance(0.1) ? draw.pick(remarks) : null,
    assessor: draw.chance(0.88) ? person.site.assessor : person.site.coordinator,
  };
}

/** The girths of one trial with one level replaced. */
const replaced = (sitting: MeasuredSitting, slip: Extract<Slip, { kind: 'trial' }>, girthMm: number): TrialReading[] =>
  sitting.trials.map((trial) => (trial.side === slip.side && trial.trial === slip.trial ? { ...trial, circumferencesMm: trial.circumferencesMm.with(slip.level, girthMm) } : trial));

function withSlip(right: MeasuredSitting, slip: Slip): MeasuredSitting {
  return slip.kind === 'weight' ? { ...right, bodyWeightG: slip.wrongG } : { ...right, trials: replaced(right, slip, slip.wrongMm) };
}

function trialSlip(right: MeasuredSitting, trialIds: ReadonlyMap<string, string>, at: { side: Side; trial: number; level: number; byMm: number }): Slip | null {
  const rightMm = right.trials.find(({ side, trial }) => side === at.side && trial === at.trial)?.circumferencesMm[at.level] ?? null;
  const third = right.trials.find(({ side, trial }) => side === at.side && trial === 3)?.circumferencesMm[at.level];
  // Only where the third reading stands already, or the slip stays within the tolerance, would the form have let it be saved.
  if (rightMm === null || third === null || third === undefined) return null;
  return { kind: 'trial', trialId: trialIds.get(`${at.side} ${at.trial}`) ?? '', side: at.side, trial: at.trial, level: at.level, wrongMm: rightMm + at.byMm, rightMm };
}

function weightSlip(right: MeasuredSitting): Slip | null {
  const typed = ((right.bodyWeightG ?? 0) / 1000).toFixed(1);
  const swapped = Number(`${typed.slice(0, -3)}${typed.at(-1)}.${typed.at(-3)}`);
  return swapped > 35 && swapped < 240 && Math.abs(swapped - Number(typed)) > 1 ? { kind: 'weight', wrongG: Math.round(swapped * 1000) } : null;
}

/** A baseline's girths are right from the start: every later change is measured from them. */
function inventSlip(draw: Draw, right: MeasuredSitting, trialIds: ReadonlyMap<string, string>, mayMisread: boolean): Slip | null {
  const fate = draw.uniform(0, 1);
  const side = draw.pick(sides);
  const byMm = draw.pick([-20, 20, 18, -17]);
  if (fate < 0.035) return weightSlip(right);
  const level = right.trials.find((trial) => trial.side === side && trial.trial === 3)?.circumferencesMm.findIndex((girth) => girth !== null) ?? -1;
  return fate < 0.12 && level >= 0 && mayMisread ? trialSlip(right, trialIds, { side, trial: 2, level, byMm }) : null;
}

/** In the story the elbow bent during the second pass, and a third reading stands at that one level. */
const storyLevel = 6;
const storyThird = (trueMm: readonly number[]): TrialReading[] => [{ side: 'left', trial: 3, circumferencesMm: trueMm.map((girth, level) => (level === storyLevel ? Math.round(girth) + 1 : null)) }];

const volumes = (result: ComputedAssessment): Row => ({
  left_volume_ml: result.leftVolumeMl === null ? null : Number(result.leftVolumeMl.toFixed(3)),
  right_volume_ml: result.rightVolumeMl === null ? null : Number(result.rightVolumeMl.toFixed(3)),
  rvc: result.rvc === null ? null : Number(result.rvc.toFixed(6)),
  verdicts: result.verdicts,
  formula_version: result.formulaVersion,
});

/** A visit begins; after its window it says why. */
const arrived = (scene: Scene, { id, on, closesOn }: { id: string; on: LocalDate; closesOn: LocalDate }): Row => ({ id, state: 'in progress', done_on: on, window_reason: on > closesOn ? 'The participant cancelled; this was the next free appointment.' : null, site_id: scene.person.site.id, participant_id: scene.person.id });

function assessmentRow({ plan, person }: Scene, visitId: string, sitting: Pick<Sitting, 'assessmentId' | 'at' | 'assessor'>): Row {
  const { measurement } = plan.protocol;
  return {
    id: sitting.assessmentId, site_id: person.site.id, participant_id: person.id, visit_id: visitId, assessor_id: sitting.assessor.accountId, measured_at: sitting.at.toISOString(),
    method: measurement.method, start_offset_mm: measurement.startOffsetMm, step_mm: measurement.stepMm,
    level_count: measurement.levelCount, tolerance_mm: measurement.toleranceMm, state: 'open',
  };
}

const trialRow = ({ person }: Scene, assessmentId: string, id: string, { side, trial, circumferencesMm }: TrialReading, savedAt: Date): Row => ({
  id, site_id: person.site.id, participant_id: person.id, assessment_id: assessmentId, side, trial, circumferences_mm: circumferencesMm, saved_at: savedAt.toISOString(),
});

/** What the form would have doubted; what was looked at again was kept with a reason. */
function findingsOf({ map, method, toleranceMm, trials }: MeasuredSitting): readonly Record<string, unknown>[] {
  const arm = (side: Side) => {
    const pass = (trial: number): readonly (number | null)[] => trials.find((row) => row.side === side && row.trial === trial)?.circumferencesMm ?? Array.from({ length: map.levels }, () => null);
    return { first: pass(1), second: pass(2), third: pass(3) };
  };
  return checkLimbSitting({ map, method, toleranceMm, left: arm('left'), right: arm('right') })
    .filter(({ severity }) => severity !== 'hint')
    .map(({ check, version, severity, message, at }) => ({ check, version, severity, message, place: placeName(at), reason: check === 'trials.differ' ? null : 'Measured again, the same.' }));
}

/** The sitting as the trail tells it: begun, pass by pass, completed, then the visit. */
export function sittingEvents(scene: Scene, sitting: Sitting): DemoEvent[] {
  const { visit, at, assessor, assessmentId, asEntered } = sitting;
  const order = asEntered.trials.toSorted((a, b) => a.trial - b.trial || a.side.localeCompare(b.side));
  const finishedAt = minutesAfter(at, 4 * order.length + 5);
  const begun = assessmentRow(scene, visit.id, sitting);
  const finished = {
    id: assessmentId, state: 'complete', completed_at: finishedAt.toISOString(), body_weight_g: asEntered.bodyWeightG, impedance_ratio: asEntered.impedanceRatio,
    impedance_rest_min: sitting.restMin, remarks: sitting.remarks,
    position: scene.plan.protocol.measurement.position, sleeve_worn: sitting.sleeveWorn, hours_since_training: sitting.hoursSinceTraining, findings: findingsOf(asEntered), ...volumes(sitting.enteredResult),
  };
  return [
    eventBy(assessor, minutesAfter(at, -4), 'visit.begin', [updated('visit', arrived(scene, { id: visit.id, on: asEntered.on, closesOn: visit.closesOn }))]),
    eventBy(assessor, at, 'assessment.begin', [inserted('limb_assessment', begun)]),
    ...order.map((trial, index) => {
      const savedAt = minutesAfter(at, 4 * (index + 1));
      return eventBy(assessor, savedAt, 'assessment.save-trial', [inserted('limb_trial', trialRow(scene, assessmentId, sitting.trialIds.get(`${trial.side} ${trial.trial}`) ?? '', trial, savedAt))]);
    }),
    eventBy(assessor, finishedAt, 'assessment.complete', [updated('limb_assessment', finished)]),
    eventBy(assessor, minutesAfter(finishedAt, 3), 'visit.complete', [updated('visit', { id: visit.id, state: 'complete' })]),
  ];
}

/** A sitting that is going on now: three of four passes saved. */
export function underWayEvents(scene: Scene, visit: PlannedVisit, on: LocalDate): DemoEvent[] {
  const { plan, person, ids, draw } = scene;
  const at = minutesAfter(plan.clock.now, -42);
  const sitting = measure(scene, { ...visit, outcome: { kind: 'done', on, minutes: 0 } }, null, null);
  const passes = sitting.sitting.trials.filter(({ side, trial }) => trial < 3 && !(side === 'right' && trial === 2)).toSorted((a, b) => a.trial - b.trial);
  const assessor = person.site.assessor;
  const begun = { ...assessmentRow(scene, visit.id, { ...sitting, at, assessor }), impedance_ratio: sitting.sitting.impedanceRatio, impedance_rest_min: 10, body_weight_g: sitting.sitting.bodyWeightG,
    position: plan.protocol.measurement.position, sleeve_worn: false, hours_since_training: draw.whole(20, 60),
  };
  return [
    eventBy(assessor, minutesAfter(at, -6), 'visit.begin', [updated('visit', arrived(scene, { id: visit.id, on, closesOn: visit.closesOn }))]),
    eventBy(assessor, at, 'assessment.begin', [inserted('limb_assessment', begun)]),
    ...passes.map((trial, index) => {
      const savedAt = minutesAfter(at, 8 + 7 * index);
      return eventBy(assessor, savedAt, 'assessment.save-trial', [inserted('limb_trial', trialRow(scene, sitting.assessmentId, ids.uuid(), trial, savedAt))]);
    }),
  ];
}

/** Putting a slip right: the value with its reason, and the results that follow from it. */
export function correctionOf(sitting: Sitting): { changes: DemoEvent['changes']; reason: string } {
  const { slip, assessmentId, result } = sitting;
  if (slip?.kind === 'weight') {
    return { changes: [updated('limb_assessment', { id: assessmentId, body_weight_g: sitting.sitting.bodyWeightG })], reason: 'Digits changed places when copied from the scale sheet.' };
  }
  if (slip?.kind === 'trial') {
    const trial = sitting.sitting.trials.find(({ side, trial: number }) => side === slip.side && number === slip.trial);
    return {
      changes: [updated('limb_trial', { id: slip.trialId, circumferences_mm: trial?.circumferencesMm ?? [] }), updated('limb_assessment', { id: assessmentId, ...volumes(result) })],
      reason: 'Misread by two centimetres; the paper sheet has the right figure.',
    };
  }
  throw new Error('There is nothing to put right.');
}
