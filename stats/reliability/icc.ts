import { fisherF } from '../distributions';
import { methodOf } from '../registry';
import { twoWayAnova, type TwoWayAnova } from './two-way-anova';
import { representable, requireLevel, type Interval, type Provenance } from '../result';

/** An F test with its real-valued degrees of freedom; f is null where it does not exist, with p = 0 where that is because no error was seen. */
export interface FTest {
  readonly f: number | null;
  readonly df1: number;
  readonly df2: number;
  readonly p: number | null;
}

/** Six intraclass correlations; single = one reading, average = mean of the k readings. */
export interface IntraclassCorrelations extends Provenance {
  readonly anova: TwoWayAnova;
  /** ICC(1,1): each subject read by other raters. */
  readonly oneWaySingle: Interval;
  /** ICC(2,1) = A,1: absolute agreement. */
  readonly agreementSingle: Interval;
  /** ICC(3,1) = C,1: consistency, column differences forgiven. */
  readonly consistencySingle: Interval;
  readonly oneWayAverage: Interval;
  readonly agreementAverage: Interval;
  readonly consistencyAverage: Interval;
  /** Satterthwaite degrees of freedom behind the agreement limits; not a whole number. */
  readonly agreementDf: number | null;
  readonly rowsTest: FTest;
  readonly columnsTest: FTest;
}

/**
 * Intraclass correlations with limits. Shrout & Fleiss 1979, Psychol Bull
 * 86:420; McGraw & Wong 1996, Psychol Methods 1:30 (agreement limits with
 * Satterthwaite's degrees of freedom). A negative estimate is reported as it
 * is: cutting it to 0 would hide that readings disagree more than subjects do.
 *
 * @param columns one per rater, equally long; subjects with a missing rating are left out.
 * @throws RangeError for fewer than two columns, unequal lengths or a level outside (0, 1).
 */
export function icc(columns: readonly ArrayLike<number>[], level = 0.95): IntraclassCorrelations {
  requireLevel(level);
  const anova = twoWayAnova(columns);
  const { n, k, leftOut } = anova;
  const provenance = { method: methodOf('icc'), n, leftOut, anova };
  const squares = squaresOf(anova);
  const why = squares === null ? 'A correlation needs two or more subjects.' : squares.rows === 0 && squares.within === 0 ? 'Every reading is equal: nothing to compare.' : null;
  const tests = {
    rowsTest: fTest(anova.meanSquareRows, anova.meanSquareError, n - 1, (n - 1) * (k - 1)),
    columnsTest: fTest(anova.meanSquareColumns, anova.meanSquareError, k - 1, (n - 1) * (k - 1)),
  };
  if (squares === null || why !== null) {
    const none: Interval = { estimate: null, lower: null, upper: null, level, reason: why! };
    const forms = { oneWaySingle: none, agreementSingle: none, consistencySingle: none, oneWayAverage: none, agreementAverage: none, consistencyAverage: none };
    return { ...provenance, ...forms, agreementDf: null, ...tests };
  }
  const oneWay = fForms(squares.rows, squares.within, n - 1, n * (k - 1), k, level);
  const consistency = fForms(squares.rows, squares.error, n - 1, (n - 1) * (k - 1), k, level);
  const agreement = agreementForms(squares, n, k, level);
  return {
    ...provenance,
    oneWaySingle: oneWay.single,
    agreementSingle: agreement.single,
    consistencySingle: consistency.single,
    oneWayAverage: oneWay.average,
    agreementAverage: agreement.average,
    consistencyAverage: consistency.average,
    agreementDf: agreement.df,
    ...tests,
  };
}

interface MeanSquares {
  readonly rows: number;
  readonly columns: number;
  readonly error: number;
  readonly within: number;
}

/** null below two subjects. */
function squaresOf({ meanSquareRows: rows, meanSquareColumns: columns, meanSquareError: error, meanSquareWithin: within }: TwoWayAnova): MeanSquares | null {
  return rows === null || columns === null || error === null || within === null ? null : { rows, columns, error, within };
}

function fTest(numerator: number | null, denominator: number | null, df1: number, df2: number): FTest {
  if (numerator === null || denominator === null || denominator === 0) return { f: null, df1, df2, p: numerator !== null && numerator > 0 ? 0 : null };
  const f = numerator / denominator;
  return { f, df1, df2, p: fisherF.sf(f, df1, df2) };
}

const NO_ERROR = 'No disagreement was seen: limits do not exist.';

/** Single and average forms whose limits come from one F ratio: rows over an error term. */
function fForms(rows: number, error: number, df1: number, df2: number, k: number, level: number): { single: Interval; average: Interval } {
  const single = (rows - error) / (rows + (k - 1) * error);
  const averageReason = { level, reason: 'Subjects do not differ: the average form does not exist.' };
  const noAverage: Interval = { estimate: null, lower: null, upper: null, ...averageReason };
  if (error === 0) {
    const one: Interval = { estimate: 1, lower: null, upper: null, level, reason: NO_ERROR };
    return { single: one, average: one };
  }
  const tail = (1 - level) / 2;
  const f = rows / error;
  const low = f / fisherF.isf(tail, df1, df2);
  const high = f * fisherF.isf(tail, df2, df1);
  const toSingle = (ratio: number): number => (ratio - 1) / (ratio + k - 1);
  return {
    single: { estimate: single, lower: toSingle(low), upper: toSingle(high), level },
    average: rows === 0 ? noAverage : representable({ estimate: (rows - error) / rows, lower: 1 - 1 / low, upper: 1 - 1 / high, level }),
  };
}

/** Absolute agreement: the column variance counts as error, so its limits need Satterthwaite's v (McGraw & Wong, table 7). */
function agreementForms({ rows, columns, error }: MeanSquares, n: number, k: number, level: number): { single: Interval; average: Interval; df: number | null } {
  const single = (rows - error) / (rows + (k - 1) * error + (k * (columns - error)) / n);
  const average = (rows - error) / (rows + (columns - error) / n);
  if (columns === 0 && error === 0) {
    const one: Interval = { estimate: 1, lower: null, upper: null, level, reason: NO_ERROR };
    return { single: one, average: one, df: null };
  }
  // Both parts of v are kept multiplied by the error mean square: it may be 0 while the columns differ.
  const fromColumns = k * single * columns;
  const fromError = (n * (1 + (k - 1) * single) - k * single) * error;
  const df = ((k - 1) * (n - 1) * (fromColumns + fromError) ** 2) / ((n - 1) * fromColumns ** 2 + fromError ** 2);
  const tail = (1 - level) / 2;
  const f1 = fisherF.isf(tail, n - 1, df);
  const f2 = fisherF.isf(tail, df, n - 1);
  const noise = k * columns + (k * n - k - n) * error;
  // Divided through by the quantile: with next to no degrees of freedom it is infinite, and the limit is still a number.
  const lower = (n * (rows / f1 - error)) / (noise + (n * rows) / f1);
  const upper = (n * (rows - error / f2)) / (noise / f2 + n * rows);
  const stepUp = (r: number): number => (k * r) / (1 + (k - 1) * r);
  return {
    single: { estimate: single, lower, upper, level },
    average: average !== average || Math.abs(average) === Infinity ? { estimate: null, lower: null, upper: null, level, reason: 'Subjects differ no more than columns do: the average form does not exist.' } : representable({ estimate: average, lower: stepUp(lower), upper: stepUp(upper), level }),
    df,
  };
}
