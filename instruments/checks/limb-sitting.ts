import { combineTrials, DEFAULT_TOLERANCE_MM } from '../measurement/combine-trials';
import { limbVolume } from '../measurement/limb-volume';
import type { GirthMethodCode } from '../measurement/index';
import { levelOffsetsMm, type MeasurementMap } from '../measurement/map';
import { armsIdentical, armsLevels } from './arms';
import type { Finding } from './define-edit-check';
import { girthLimit, girthRange } from './girth';
import { armVolume } from './measured-ranges';
import { taperFindings, taperImpossible, taperUnusual } from './taper';
import { trialsDiffer, trialsFarApart } from './trials';

/** Girths of one arm by trial, wrist upward, integer millimetres; null = not measured. */
export interface ArmTrials {
  readonly first: readonly (number | null)[];
  readonly second: readonly (number | null)[];
  readonly third: readonly (number | null)[];
}

/** One sitting as the entry screen holds it and the server receives it. */
export interface LimbSitting {
  readonly map: MeasurementMap;
  readonly method: GirthMethodCode;
  readonly toleranceMm?: number;
  readonly left: ArmTrials;
  readonly right: ArmTrials;
}

export type TrialName = keyof ArmTrials;

/** Where on the grid a finding belongs; whole-arm and whole-sitting findings leave the rest out. */
export interface GridPlace {
  readonly side?: 'left' | 'right';
  readonly trial?: TrialName;
  readonly level?: number;
}

export type SittingFinding = Finding & { readonly at: GridPlace };

const armSides = ['left', 'right'] as const;
const trialNames = ['first', 'second', 'third'] as const;

/**
 * What may be said while trials are open: the plausibility of each value, the taper within a pass, trial against trial.
 * Nothing from earlier visits is looked at. Order: left then right, wrist upward within each kind.
 */
export function checkOpenTrials(sitting: LimbSitting): SittingFinding[] {
  return armSides.flatMap((side) => {
    const arm = sitting[side];
    return [...valueFindings(sitting, side), ...trialNames.flatMap((trial) => taperOf(arm[trial], { side, trial, stepMm: sitting.map.stepMm })), ...trialFindings(sitting, side)];
  });
}

/** Everything a sitting says by itself once it is to be saved as complete: the open-trial findings, levels, likeness and volume. */
export function checkLimbSitting(sitting: LimbSitting): SittingFinding[] {
  const leftMm = combinedGirthsMm(sitting, 'left');
  const rightMm = combinedGirthsMm(sitting, 'right');
  const whole = [armsIdentical.run({ leftMm, rightMm }), armsLevels.run({ leftMm, rightMm, levels: sitting.map.levels })];
  return [
    ...checkOpenTrials(sitting),
    ...whole.flatMap((finding) => place(finding, {})),
    ...armSides.flatMap((side) => volumeFindings(sitting, side)),
  ];
}

/** The girth each level comes to by the trial rule, wrist upward; null while it is open. */
export function combinedGirthsMm({ map, toleranceMm = DEFAULT_TOLERANCE_MM, ...arms }: LimbSitting, side: 'left' | 'right'): (number | null)[] {
  const { first, second, third } = arms[side];
  return Array.from({ length: map.levels }, (_, level) =>
    combineTrials({ first: first[level] ?? null, second: second[level] ?? null, third: third[level] ?? null }, toleranceMm).girthMm);
}

function place(finding: Finding | null, at: GridPlace): SittingFinding[] {
  return finding ? [{ ...finding, at }] : [];
}

function valueFindings(sitting: LimbSitting, side: 'left' | 'right'): SittingFinding[] {
  const offsets = levelOffsetsMm(sitting.map);
  return trialNames.flatMap((trial) => sitting[side][trial].flatMap((girthMm, level) => {
    if (girthMm === null) return [];
    const reading = { girthMm, offsetMm: offsets[level] ?? 0 };
    return place(girthLimit.run(reading) ?? girthRange.run(reading), { side, trial, level });
  }));
}

/** One finding for each doubtful step, at the upper of the two levels. */
function taperOf(girthsMm: readonly (number | null)[], { side, trial, stepMm }: { side: 'left' | 'right'; trial: TrialName; stepMm: number }): SittingFinding[] {
  const { unusual, impossible } = taperFindings({ girthsMm, stepMm });
  const steps = [...impossible.map((step) => ({ ...step, check: taperImpossible })), ...unusual.map((step) => ({ ...step, check: taperUnusual }))];
  return steps.toSorted((a, b) => a.level - b.level).flatMap(({ level, check }) => {
    const pair = { girthsMm: [girthsMm[level] ?? null, girthsMm[level + 1] ?? null], stepMm };
    return place(check.run(pair), { side, trial, level: level + 1 });
  });
}

function trialFindings({ toleranceMm, ...sitting }: LimbSitting, side: 'left' | 'right'): SittingFinding[] {
  const { first, second, third } = sitting[side];
  return first.flatMap((firstMm, level) => {
    const secondMm = second[level] ?? null;
    if (firstMm === null || secondMm === null) return [];
    const pair = { firstMm, secondMm, isThirdTaken: (third[level] ?? null) !== null, ...(toleranceMm !== undefined && { toleranceMm }) };
    return place(trialsFarApart.run(pair) ?? trialsDiffer.run(pair), { side, trial: 'second', level });
  });
}

const ABOUT_40_CM_MM = 360;

function volumeFindings(sitting: LimbSitting, side: 'left' | 'right'): SittingFinding[] {
  const { volumeMl, lengthMm } = limbVolume({ method: sitting.method, girthsMm: combinedGirthsMm(sitting, side), map: sitting.map });
  if (volumeMl === null || lengthMm < ABOUT_40_CM_MM) return [];
  return place(armVolume.limit.run(volumeMl) ?? armVolume.range.run(volumeMl), { side });
}
