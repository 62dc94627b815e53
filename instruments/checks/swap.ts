import { defineEditCheck } from './define-edit-check';

/** Both arms now and at the last visit, levels measured both times only. */
export interface ArmsThenAndNow {
  readonly previousLeftMm: readonly number[];
  readonly previousRightMm: readonly number[];
  readonly leftMm: readonly number[];
  readonly rightMm: readonly number[];
}

export interface SwapVerdict {
  /** Sums of squared differences from the last visit, in cm². */
  readonly asEnteredCm2: number;
  readonly swappedCm2: number;
  readonly rmsCm: number;
  readonly isSuspect: boolean;
}

/** Would the arms fit the last visit much better the other way round? Suspect below half the squares, with over 0.5 cm RMS as entered. */
export function leftRightSwap({ previousLeftMm, previousRightMm, leftMm, rightMm }: ArmsThenAndNow): SwapVerdict {
  const asEntered = squares(leftMm, previousLeftMm) + squares(rightMm, previousRightMm);
  const swapped = squares(leftMm, previousRightMm) + squares(rightMm, previousLeftMm);
  const rmsCm = Math.sqrt(asEntered / (leftMm.length + rightMm.length)) / 10;
  return { asEnteredCm2: asEntered / 100, swappedCm2: swapped / 100, rmsCm, isSuspect: swapped < 0.5 * asEntered && rmsCm > 0.5 };
}

function squares(a: readonly number[], b: readonly number[]): number {
  if (a.length !== b.length || a.length === 0) throw new RangeError('Both visits need the same levels, one at least.');
  return a.reduce((sum, value, i) => sum + (value - (b[i] ?? value)) ** 2, 0);
}

const left = [161, 189, 232, 259, 269, 294];
const right = [166, 202, 251, 274, 280, 306];

export const armsSwapped = defineEditCheck<ArmsThenAndNow>({
  id: 'arms.swapped',
  version: 1,
  severity: 'soft',
  uses: 'history',
  title: 'Left and right may be swapped',
  source: 'common practice, no source; checks DQ-01, DQ-02',
  run(arms) {
    return leftRightSwap(arms).isSuspect ? { message: 'Left and right may be swapped: the arms fit the last visit much better the other way round. Look which arm was read, or keep them and say why.' } : null;
  },
  examplePass: { previousLeftMm: left, previousRightMm: right, leftMm: left, rightMm: right },
  exampleFires: { previousLeftMm: left, previousRightMm: right, leftMm: right, rightMm: left },
});
