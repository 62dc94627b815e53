import { printGirthCm } from '../numbers';
import { defineEditCheck } from './define-edit-check';

/** One pass up one arm; `null` = not measured. */
export interface GirthColumn {
  readonly girthsMm: readonly (number | null)[];
  readonly stepMm: number;
}

export interface TaperViolation {
  /** Index of the lower of the two levels. */
  readonly level: number;
  /** Upper minus lower girth. */
  readonly changeMm: number;
}

const REFERENCE_STEP_MM = 40;

/** Neighbouring levels, wrist upward, where the arm narrows or widens by more than the limits; exact limits pass. */
export function taperViolations(girthsMm: readonly (number | null)[], { maxDropMm, maxRiseMm }: { maxDropMm: number; maxRiseMm: number }): TaperViolation[] {
  return girthsMm.slice(1).flatMap((upper, level) => {
    const lower = girthsMm[level] ?? null;
    if (upper === null || lower === null) return [];
    const changeMm = upper - lower;
    return changeMm < -maxDropMm || changeMm > maxRiseMm ? [{ level, changeMm }] : [];
  });
}

/** Limits are given for 4 cm between levels and grow with the step. */
function limitsFor(stepMm: number, { dropMm, riseMm }: { dropMm: number; riseMm: number }): { maxDropMm: number; maxRiseMm: number } {
  const scale = stepMm / REFERENCE_STEP_MM;
  return { maxDropMm: dropMm * scale, maxRiseMm: riseMm * scale };
}

const usual = { dropMm: 10, riseMm: 35 };
const limit = { dropMm: 50, riseMm: 80 };

export function taperFindings({ girthsMm, stepMm }: GirthColumn): { unusual: TaperViolation[]; impossible: TaperViolation[] } {
  const impossible = taperViolations(girthsMm, limitsFor(stepMm, limit));
  const unusual = taperViolations(girthsMm, limitsFor(stepMm, usual)).filter(({ level }) => !impossible.some((worse) => worse.level === level));
  return { unusual, impossible };
}

function describe({ level, changeMm }: TaperViolation, { girthsMm, stepMm }: GirthColumn): string {
  const upper = girthsMm[level + 1] ?? 0;
  return `${printGirthCm(upper)} is ${printGirthCm(Math.abs(changeMm))} cm ${changeMm < 0 ? 'narrower' : 'wider'} than the level ${stepMm / 10} cm below.`;
}

export const taperImpossible = defineEditCheck<GirthColumn>({
  id: 'taper.limit',
  version: 2,
  severity: 'soft',
  uses: 'this-sitting',
  title: 'Neighbouring levels: more than an arm can change',
  source: 'common practice, no source',
  run(column) {
    const [first] = taperFindings(column).impossible;
    return first ? { message: `${describe(first, column)} Measure both again, or keep them and say why.`, value: girthAbove(first, column) } : null;
  },
  examplePass: { girthsMm: [160, 172, 190, 212, 234, 251, 260, 264, 270, 282, 296], stepMm: 40 },
  exampleFires: { girthsMm: [160, 172, 190, 212, 234, 521, 260, 264, 270, 282, 296], stepMm: 40 },
});

export const taperUnusual = defineEditCheck<GirthColumn>({
  id: 'taper.range',
  version: 1,
  severity: 'hint',
  uses: 'this-sitting',
  title: 'Neighbouring levels: an unusual step',
  source: 'common practice, no source; the elbow may dip',
  run(column) {
    const [first] = taperFindings(column).unusual;
    return first ? { message: `${describe(first, column)} Measure it again, or keep it if it is so.`, value: girthAbove(first, column) } : null;
  },
  examplePass: { girthsMm: [160, 172, 190, 212, 234, 251, 260, 264, 270, 282, 296], stepMm: 40 },
  exampleFires: { girthsMm: [160, 172, 190, 212, 249, 236, 260, 264, 270, 282, 296], stepMm: 40 },
});

function girthAbove({ level }: TaperViolation, { girthsMm }: GirthColumn): number {
  return girthsMm[level + 1] ?? 0;
}
