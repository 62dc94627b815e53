/** The different pairs of events and trials among rows, and how many rows have each. */
export interface Tally {
  readonly y: Float64Array;
  readonly m: Float64Array;
  readonly rows: Float64Array;
}

/** Single trials and counts up to here, which is nearly all that occurs, are tallied in an array. */
const SMALL = 256;

/** What depends on a row's count alone (log factorials above all) is then worked out once a count, not once a row. */
export function tallyOf(y: Float64Array, m: Float64Array): Tally {
  const small = new Float64Array(SMALL);
  const others = new Map<number, Map<number, number>>();
  for (let row = 0; row < y.length; row++) {
    const [count, trials] = [y[row]!, m[row]!];
    if (trials === 1 && count < SMALL) {
      small[count]!++;
      continue;
    }
    let own = others.get(count);
    if (own === undefined) others.set(count, (own = new Map<number, number>()));
    own.set(trials, (own.get(trials) ?? 0) + 1);
  }
  const triples: [number, number, number][] = [];
  small.forEach((rows, count) => {
    if (rows > 0) triples.push([count, 1, rows]);
  });
  for (const [count, own] of others) for (const [trials, rows] of own) triples.push([count, trials, rows]);
  const column = (at: 0 | 1 | 2): Float64Array => Float64Array.from(triples, (triple) => triple[at]);
  return { y: column(0), m: column(1), rows: column(2) };
}

/** Sum over all rows of a function of their counts. */
export function sumOver({ y, m, rows }: Tally, of: (y: number, m: number) => number): number {
  let sum = 0;
  for (let k = 0; k < y.length; k++) sum += rows[k]! * of(y[k]!, m[k]!);
  return sum;
}
