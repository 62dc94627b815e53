import { isBefore } from './times';
import type { Codes } from './strata';

/** Keeps the number at risk in each group while a sweep moves forward in time. */
export class RiskCounter {
  readonly atRisk: Uint32Array;
  total = 0;
  private readonly entered: Uint32Array | undefined;
  private next = 0;

  /** @param rows the rows of the sweep in order of time of leaving */
  constructor(
    private readonly group: Codes,
    groups: number,
    private readonly rows: Uint32Array,
    private readonly entry: Float64Array | undefined,
  ) {
    this.atRisk = new Uint32Array(groups);
    if (entry !== undefined) {
      this.entered = rows.slice().sort((a, b) => entry[a]! - entry[b]!);
      return;
    }
    for (let i = 0; i < rows.length; i++) this.atRisk[group[rows[i]!]!]!++;
    this.total = rows.length;
  }

  /** Lets in the rows whose entry is strictly before t. */
  enterBefore(t: number): void {
    if (this.entered === undefined || this.entry === undefined) return;
    while (this.next < this.entered.length && isBefore(this.entry[this.entered[this.next]!]!, t)) {
      this.atRisk[this.group[this.entered[this.next]!]!]!++;
      this.total++;
      this.next++;
    }
  }

  /** Takes out the rows at positions from … to - 1 of the sweep. */
  leave(from: number, to: number): void {
    for (let i = from; i < to; i++) this.atRisk[this.group[this.rows[i]!]!]!--;
    this.total -= to - from;
  }
}
