import { chiSquare } from '../distributions';
import { methodOf } from '../registry';
import { sdcFromSem } from './sdc-from-sem';
import { twoWayAnova } from './two-way-anova';
import { requireLevel, type Estimate } from '../result';

/** Standard errors of measurement in the unit of the readings; the estimate and limits are the consistency form. */
export interface MeasurementError extends Estimate {
  /** SEM with differences between columns counted as error; a negative column variance counts as none. */
  readonly semAgreement: number | null;
  readonly sdcConsistency: number | null;
  readonly sdcAgreement: number | null;
  /** May be negative: the columns then differ less than chance would have them. */
  readonly varianceBetweenColumns: number | null;
  readonly varianceBetweenRows: number | null;
}

/**
 * Standard error of measurement and smallest detectable change from repeated
 * readings: SEM = sqrt(residual mean square), limits by chi-square; SDC =
 * z sqrt(2) SEM. de Vet et al. 2006, J Clin Epidemiol 59:1033.
 *
 * @param columns one per trial or rater; subjects with a missing reading are left out.
 * @throws RangeError for fewer than two columns, unequal lengths or a level outside (0, 1).
 */
export function measurementError(columns: readonly ArrayLike<number>[], level = 0.95): MeasurementError {
  requireLevel(level);
  const { n, k, leftOut, meanSquareRows, meanSquareColumns, meanSquareError } = twoWayAnova(columns);
  const provenance = { level, method: methodOf('measurementError'), n, leftOut };
  if (meanSquareRows === null || meanSquareColumns === null || meanSquareError === null) {
    const none = { semAgreement: null, sdcConsistency: null, sdcAgreement: null, varianceBetweenColumns: null, varianceBetweenRows: null };
    return { estimate: null, lower: null, upper: null, reason: 'Measurement error needs two or more subjects.', ...none, ...provenance };
  }
  const df = (n - 1) * (k - 1);
  const tail = (1 - level) / 2;
  const sem = Math.sqrt(meanSquareError);
  const varianceBetweenColumns = (meanSquareColumns - meanSquareError) / n;
  const semAgreement = Math.sqrt(meanSquareError + Math.max(0, varianceBetweenColumns));
  return {
    estimate: sem,
    lower: Math.sqrt((df * meanSquareError) / chiSquare.isf(tail, df)),
    upper: Math.sqrt((df * meanSquareError) / chiSquare.quantile(tail, df)),
    semAgreement,
    sdcConsistency: sdcFromSem(sem),
    sdcAgreement: sdcFromSem(semAgreement),
    varianceBetweenColumns,
    varianceBetweenRows: (meanSquareRows - meanSquareError) / k,
    ...provenance,
  };
}
