import { chiSquare } from '@/stats/distributions';
import { defineEditCheck } from './define-edit-check';

export interface DigitPreference {
  readonly n: number;
  readonly chi2: number;
  readonly df: 9;
  readonly p: number;
  readonly share0or5: number;
  readonly isSuspect: boolean;
}

/** How evenly an assessor's last digits fall. `counts` holds ten counts, of 0 to 9. Suspect from 50 readings, p < 0.001 and over 40 % at 0 or 5. */
export function digitPreference(counts: readonly number[]): DigitPreference {
  const n = counts.reduce((sum, count) => sum + count, 0);
  if (counts.length !== 10 || n === 0) throw new RangeError('Digit preference needs ten counts with a reading at least.');
  const expected = n / 10;
  const chi2 = counts.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
  const p = chiSquare.sf(chi2, 9);
  const share0or5 = ((counts[0] ?? 0) + (counts[5] ?? 0)) / n;
  return { n, chi2, df: 9, p, share0or5, isSuspect: n >= 50 && p < 0.001 && share0or5 > 0.4 };
}

/** Counts of the last millimetre digit over readings in integer millimetres. */
export function lastDigitCounts(girthsMm: readonly number[]): number[] {
  const counts = Array.from({ length: 10 }, () => 0);
  for (const girth of girthsMm) {
    const digit = Math.abs(Math.round(girth)) % 10;
    counts[digit] = (counts[digit] ?? 0) + 1;
  }
  return counts;
}

export const assessorDigits = defineEditCheck<{ readonly counts: readonly number[] }>({
  id: 'assessor.digits',
  version: 1,
  severity: 'soft',
  uses: 'history',
  title: 'An assessor’s readings crowd at 0 and 5 mm',
  source: 'common practice, no source; checks DQ-03, DQ-04',
  run({ counts }) {
    const { isSuspect, share0or5, n } = digitPreference(counts);
    return isSuspect ? { message: `${Math.round(share0or5 * 100)} % of ${n} readings end in 0 or 5 mm; 20 % is expected. Ask the assessor to read to the millimetre.`, value: share0or5 } : null;
  },
  examplePass: { counts: [14, 17, 12, 15, 16, 13, 18, 14, 16, 15] },
  exampleFires: { counts: [38, 8, 9, 7, 10, 42, 6, 9, 11, 10] },
});

const PAIRS_NEEDED = 20;

export const assessorRepeats = defineEditCheck<{ readonly differencesMm: readonly number[] }>({
  id: 'assessor.repeats',
  version: 1,
  severity: 'soft',
  uses: 'history',
  title: 'An assessor’s second trials always equal the first',
  source: 'common practice, no source',
  run({ differencesMm }) {
    const isAllZero = differencesMm.length >= PAIRS_NEEDED && differencesMm.every((difference) => difference === 0);
    return isAllZero ? { message: `All ${differencesMm.length} second readings equal the first. Ask whether the second pass was taken with the marks read again.` } : null;
  },
  examplePass: { differencesMm: [...Array.from({ length: 19 }, () => 0), 1] },
  exampleFires: { differencesMm: Array.from({ length: 20 }, () => 0) },
});
