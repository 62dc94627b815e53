import type { LocalDate } from '@/instruments/calendar';
import { daysBetween } from '@/instruments/calendar';
import { combineTrials } from '@/instruments/measurement/combine-trials';
import { FORMULA_VERSION } from '@/instruments/measurement/formula-version';
import type { ImpedanceCutoffSet } from '@/instruments/measurement/impedance-ratio';
import type { Limb } from '@/instruments/measurement/limb';
import { limbVolume } from '@/instruments/measurement/limb-volume';
import { isSameMap, type MeasurementMap } from '@/instruments/measurement/map';
import { defaultSwellingContext, type SwellingAssessment, type SwellingContext, type SwellingVerdict } from '@/instruments/swelling/define-swelling';
import { judgeSwelling, type SwellingCode } from '@/instruments/swelling';
import { rvcOf } from '@/instruments/swelling/relative-change';

/** One pass of the tape over one arm, wrist upward, in whole millimetres; null = not read. */
export interface TrialReading {
  readonly side: 'left' | 'right';
  readonly trial: number;
  readonly circumferencesMm: readonly (number | null)[];
}

/** One sitting with tape, scale and impedance, as it was recorded. */
export interface MeasuredSitting {
  readonly on: LocalDate;
  readonly method: 'frustum' | 'disk';
  readonly map: MeasurementMap;
  readonly toleranceMm: number;
  readonly trials: readonly TrialReading[];
  readonly bodyWeightG: number | null;
  readonly impedanceRatio: number | null;
}

/** Facts of the participant that say which arm is at risk. */
export interface ArmsOfParticipant {
  readonly affectedSide: 'left' | 'right';
  readonly dominantSide: 'left' | 'right' | 'both';
  readonly surgeryOn: LocalDate;
}

/** What the protocol version sets for the definitions. */
export interface SwellingSettings {
  readonly earlyExclusionDays: number;
  readonly impedanceCutoffs: string;
}

/** What is stored with an assessment. Volumes in millilitres, null when a level is not settled; rvc as a ratio. */
export interface ComputedAssessment {
  readonly leftVolumeMl: number | null;
  readonly rightVolumeMl: number | null;
  readonly rvc: number | null;
  readonly verdicts: Readonly<Record<SwellingCode, SwellingVerdict>>;
  readonly formulaVersion: string;
}

/** Settled girths of one arm: trials combined level by level; null where a level is missing or waits for its third reading. */
export function settledGirthsMm({ trials, map, toleranceMm }: Pick<MeasuredSitting, 'trials' | 'map' | 'toleranceMm'>, side: 'left' | 'right'): (number | null)[] {
  const reading = (trial: number, level: number): number | null =>
    trials.find((candidate) => candidate.side === side && candidate.trial === trial)?.circumferencesMm[level] ?? null;
  return Array.from({ length: map.levels }, (_, level) =>
    combineTrials({ first: reading(1, level), second: reading(2, level), third: reading(3, level) }, toleranceMm).girthMm,
  );
}

function armOf(sitting: MeasuredSitting, side: 'left' | 'right'): Limb {
  const girthsMm = settledGirthsMm(sitting, side);
  return { girthsMm, volumeMl: limbVolume({ method: sitting.method, girthsMm, map: sitting.map }).volumeMl };
}

function asJudged(sitting: MeasuredSitting, { affectedSide, surgeryOn }: ArmsOfParticipant): SwellingAssessment {
  const { bodyWeightG, impedanceRatio, on } = sitting;
  return {
    on,
    atRisk: armOf(sitting, affectedSide),
    unaffected: armOf(sitting, affectedSide === 'left' ? 'right' : 'left'),
    daysSinceSurgery: daysBetween({ from: surgeryOn, to: on }),
    weightKg: bodyWeightG === null ? null : bodyWeightG / 1000,
    // The record holds the ratio; two impedances in that ratio say the same to the definition.
    impedance: impedanceRatio === null ? null : { atRiskOhm: 1, unaffectedOhm: impedanceRatio },
    reportedSymptoms: null,
    clinicianDiagnosed: null,
  };
}

const cutoffSets: readonly ImpedanceCutoffSet[] = ['2001-3sd', '2011-2sd', '2011-3sd', '2018-2sd', '2018-3sd'];

function cutoffSetOf(name: string): ImpedanceCutoffSet {
  const found = cutoffSets.find((set) => set === name);
  if (!found) throw new RangeError(`There is no set of impedance cut-offs called ${name}.`);
  return found;
}

function contextOf(sitting: MeasuredSitting, baseline: MeasuredSitting | null, arms: ArmsOfParticipant, settings: SwellingSettings): SwellingContext {
  const comparable = baseline === null || (baseline.method === sitting.method && isSameMap(baseline.map, sitting.map));
  return {
    ...defaultSwellingContext,
    atRiskIsDominant: arms.dominantSide === 'both' ? null : arms.dominantSide === arms.affectedSide,
    earlyExclusionDays: settings.earlyExclusionDays,
    impedanceCutoffs: cutoffSetOf(settings.impedanceCutoffs),
    ...(!comparable && { notComparable: 'Baseline and visit were measured by another method or other levels, so change is not computed.' }),
  };
}

/**
 * Volumes of both arms, relative volume change and every definition's verdict for one sitting. Pure.
 *
 * `baseline` is the baseline sitting as recorded; null at the baseline itself, where change does not exist. Change across
 * methods or maps is not computed. Formulas: instruments/measurement and instruments/swelling.
 * @throws RangeError for an unknown set of impedance cut-offs, or a number of levels that does not fit the map.
 */
export function computeAssessment(input: {
  readonly sitting: MeasuredSitting;
  readonly arms: ArmsOfParticipant;
  readonly baseline: MeasuredSitting | null;
  readonly settings: SwellingSettings;
}): ComputedAssessment {
  const { sitting, arms, baseline, settings } = input;
  const now = asJudged(sitting, arms);
  const before = baseline && asJudged(baseline, arms);
  const context = contextOf(sitting, baseline, arms, settings);
  const verdicts = judgeSwelling(now, before, context).map(({ code, ...verdict }) => [code, verdict] as const);
  const isLeftAtRisk = arms.affectedSide === 'left';
  return {
    leftVolumeMl: isLeftAtRisk ? now.atRisk.volumeMl : now.unaffected.volumeMl,
    rightVolumeMl: isLeftAtRisk ? now.unaffected.volumeMl : now.atRisk.volumeMl,
    rvc: context.notComparable ? null : rvcOf(now, before),
    verdicts: Object.fromEntries(verdicts) as Record<SwellingCode, SwellingVerdict>,
    formulaVersion: FORMULA_VERSION,
  };
}
