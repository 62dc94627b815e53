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
 * @throws RangeError for unequal columns or two rows of one subject at one visit.
 */
export function missingByVisit(subjects: ArrayLike<number>, visits: ArrayLike<number>, values: ArrayLike<number>): MissingByVisit {
  const rows = subjects.length;
  requireRange(visits.length === rows && values.length === rows, `Columns must be equally long: ${rows}, ${visits.length} and ${values.length} rows.`);
  const schedule = [...new Set(Array.from(visits))].sort((a, b) => a - b);
  const position = new Map(schedule.map((visit, at) => [visit, at]));
  const seen = new Map<number, { observed: Uint8Array; rows: Uint8Array }>();
  for (let row = 0; row < rows; row++) {
    const subject = seen.get(subjects[row]!) ?? { observed: new Uint8Array(schedule.length), rows: new Uint8Array(schedule.length) };
    const at = position.get(visits[row]!)!;
    requireRange(subject.rows[at] === 0, `Subject ${subjects[row]} has two rows at visit ${visits[row]}.`);
    subject.rows[at] = 1;
    subject.observed[at] = Number.isNaN(values[row]) ? 0 : 1;
    seen.set(subjects[row]!, subject);
  }
  const people = [...seen.values()].map(({ observed }) => observed);
  const expected = people.length;
  const byVisit = schedule.map((visit, at) => {
    const observed = people.reduce((sum, person) => sum + person[at]!, 0);
    return { visit, expected, observed, missing: expected - observed, percentMissing: (100 * (expected - observed)) / expected };
  });
  const monotone = people.filter((person) => !person.subarray(0, person.lastIndexOf(1) + 1).includes(0)).length;
  return {
    method: methodOf('missingByVisit'),
    n: expected,
    leftOut: [],
    visits: byVisit,
    complete: people.filter((person) => !person.includes(0)).length,
    monotone,
    intermittent: expected - monotone,
  };
}
