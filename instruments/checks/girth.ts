import { printGirthCm } from '../numbers';
import { CM_PER_INCH } from '../units';
import { defineEditCheck } from './define-edit-check';
import { isWithin, shiftedInto } from './range-check';

/** A reading and where it was taken, in millimetres above the styloid. */
export interface GirthReading {
  readonly girthMm: number;
  readonly offsetMm: number;
}

interface LevelLimits {
  readonly usualMm: readonly [number, number];
  readonly limitMm: readonly [number, number];
}

/** Per 4 cm level from the wrist. Experience, no source: a study replaces them by its own percentiles after some 200 baselines. */
const limitsByLevel: readonly LevelLimits[] = [
  { usualMm: [130, 200], limitMm: [100, 350] },
  { usualMm: [135, 220], limitMm: [100, 400] },
  { usualMm: [150, 250], limitMm: [110, 420] },
  { usualMm: [170, 280], limitMm: [120, 450] },
  { usualMm: [190, 310], limitMm: [130, 480] },
  { usualMm: [200, 340], limitMm: [140, 500] },
  { usualMm: [200, 350], limitMm: [150, 520] },
  { usualMm: [200, 370], limitMm: [150, 550] },
  { usualMm: [210, 400], limitMm: [160, 600] },
  { usualMm: [220, 440], limitMm: [160, 650] },
  { usualMm: [230, 480], limitMm: [170, 700] },
];

const LEVEL_STEP_MM = 40;

/** The limits of the 4 cm level nearest to the mark. */
export function girthLimitsMm(offsetMm: number): LevelLimits {
  const level = Math.min(limitsByLevel.length - 1, Math.max(0, Math.round(offsetMm / LEVEL_STEP_MM)));
  const limits = limitsByLevel[level];
  if (!limits) throw new RangeError(`There is no level at ${offsetMm} mm.`);
  return limits;
}

/** Centimetres the reading would be if it had been typed in inches, where only then it would be usual; otherwise null. */
export function girthIfInchesCm({ girthMm, offsetMm }: GirthReading): number | null {
  const { usualMm, limitMm } = girthLimitsMm(offsetMm);
  const asInchesMm = girthMm * CM_PER_INCH;
  return girthMm < limitMm[0] && isWithin(asInchesMm, usualMm) ? asInchesMm / 10 : null;
}

const SOURCE = 'common practice, no source';

export const girthLimit = defineEditCheck<GirthReading>({
  id: 'girth.limit',
  version: 1,
  severity: 'hard',
  uses: 'this-sitting',
  title: 'Girth: limits at each level',
  source: SOURCE,
  run({ girthMm, offsetMm }) {
    const { usualMm, limitMm } = girthLimitsMm(offsetMm);
    if (isWithin(girthMm, limitMm)) return null;
    const side = girthMm > limitMm[1] ? `over the limit of ${limitMm[1] / 10}` : `under the limit of ${limitMm[0] / 10}`;
    const inchesCm = girthIfInchesCm({ girthMm, offsetMm });
    const shiftedMm = shiftedInto(girthMm, usualMm);
    if (inchesCm !== null) {
      return { message: `${printGirthCm(girthMm)} cm is ${side}. In inches it would be ${inchesCm.toFixed(1)} cm. Read the tape again.`, value: girthMm, suggestion: Math.round(inchesCm * 10) };
    }
    if (shiftedMm === undefined) return { message: `${printGirthCm(girthMm)} cm is ${side} at this level. Measure it again.`, value: girthMm };
    return { message: `${printGirthCm(girthMm)} cm is ${side}. Was it ${printGirthCm(Math.round(shiftedMm))}?`, value: girthMm, suggestion: Math.round(shiftedMm) };
  },
  examplePass: { girthMm: 251, offsetMm: 200 },
  exampleFires: { girthMm: 521, offsetMm: 200 },
});

export const girthRange = defineEditCheck<GirthReading>({
  id: 'girth.range',
  version: 1,
  severity: 'hint',
  uses: 'this-sitting',
  title: 'Girth: usual range at each level',
  source: SOURCE,
  run({ girthMm, offsetMm }) {
    const { usualMm, limitMm } = girthLimitsMm(offsetMm);
    if (!isWithin(girthMm, limitMm) || isWithin(girthMm, usualMm)) return null;
    return { message: `${printGirthCm(girthMm)} cm is outside the usual ${usualMm[0] / 10} to ${usualMm[1] / 10} at this level. Check the mark and the tape; keep it if it is so.`, value: girthMm };
  },
  examplePass: { girthMm: 251, offsetMm: 200 },
  exampleFires: { girthMm: 360, offsetMm: 200 },
});
