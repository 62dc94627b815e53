import { orderByTwo } from '../progression/order-by-two';
import { methodOf } from '../registry';
import { requireRange, type Provenance } from '../result';

export interface VisitCompleteness {
  readonly visit: number;
  readonly expected: number;
  readonly observed: number;
  readonly missing: number;
  readonly percentMissing: number;
}

/** What was seen when, and in what way it is incomplete. */
export interface MissingByVisit extends Provenance {
  readonly visits: readonly VisitCompleteness[];
  /** Subjects seen at every visit; also counted as monotone. */
  readonly complete: number;
  /** Nothing missing before the last value seen: drop-out only (or never seen). */
  readonly monotone: number;
  /** Missing, then seen again. */
  readonly intermittent: number;
}

/**
 * Completeness of a repeated measurement. Every subject is expected at every
 * visit that occurs; a row that is not there and a row without a value are both
 * missing. Monotone and intermittent as in Diggle et al. 2002, Analysis of
 * Longitudinal Data, ch. 13. `n` counts subjects.
 *
 * @param subjects and @param visits numbers that name subject and visit of each row; @param values NaN is missing.
 * @throws RangeError for unequal columns, a subject or visit that is missing, or two rows of one subject at one visit.
 */
export function missingByVisit(subjects: ArrayLike<number>, visits: ArrayLike<number>, values: ArrayLike<number>): MissingByVisit {
  const rows = subjects.length;
  requireRange(visits.length === rows && values.length === rows, `Columns must be equally long: ${rows}, ${visits.length} and ${values.length} rows.`);
  for (let row = 0; row < rows; row++) {
    if (!(Number.isFinite(subjects[row]) && Number.isFinite(visits[row]))) throw new RangeError(`Row ${row} names subject ${subjects[row]} and visit ${visits[row]}; names are finite numbers.`);
  }
  const schedule = [...new Set(Array.from(visits, (visit) => visit + 0))].sort((a, b) => a - b);
  const position = new Map(schedule.map((visit, at) => [visit, at]));
  const subject = Float64Array.from(subjects);
  const visit = Float64Array.from(visits);
  const observedAt = new Float64Array(schedule.length);
  let [expected, complete, monotone] = [0, 0, 0];
  const order = orderByTwo(subject, visit);
  // Subject by subject, visits ascending: nothing the size of subjects times visits is ever made.
  for (let start = 0; start < rows; ) {
    let observed = 0;
    let last = -1;
    let end = start;
    for (; end < rows && subject[order[end]!] === subject[order[start]!]; end++) {
      const row = order[end]!;
      if (end > start && visit[row] === visit[order[end - 1]!]) throw new RangeError(`Subject ${subjects[row]} has two rows at visit ${visits[row]}.`);
      if (Number.isNaN(values[row])) continue;
      last = position.get(visit[row]!)!;
      observedAt[last]!++;
      observed++;
    }
    expected++;
    if (observed === schedule.length) complete++;
    if (observed === last + 1) monotone++;
    start = end;
  }
  const byVisit = schedule.map((visit, at) => {
    const observed = observedAt[at]!;
    return { visit, expected, observed, missing: expected - observed, percentMissing: (100 * (expected - observed)) / expected };
  });
  return {
    method: methodOf('missingByVisit'),
    n: expected,
    leftOut: [],
    visits: byVisit,
    complete,
    monotone,
    intermittent: expected - monotone,
  };
}
