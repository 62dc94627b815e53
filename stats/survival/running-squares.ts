/**
 * Sum of w (c + x)² over terms that all share a moving x: the variance of a
 * cumulative incidence needs it at every time. Each move costs the same
 * whatever the number of terms, and no large sums are subtracted at the end.
 */
export class RunningSquares {
  private weight = 0;
  private linear = 0;
  private square = 0;

  /** Adds a term that stands at c now. */
  add(w: number, c: number): void {
    this.weight += w;
    this.linear += w * c;
    this.square += w * c * c;
  }

  /** Moves every term by delta. */
  move(delta: number): void {
    this.square += delta * (2 * this.linear + delta * this.weight);
    this.linear += delta * this.weight;
  }

  /** Sum of w c². */
  get sum(): number {
    return this.square;
  }

  /** Sum of w c. */
  get firstMoment(): number {
    return this.linear;
  }
}
