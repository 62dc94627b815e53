/** Columns of a data set: what both sides are given. */
export type Columns = Readonly<Record<string, Float64Array>>;

/** One statistic, timed on our side and in R on the same numbers. */
export interface BenchTask {
  /** Also the name of the R function's entry in `tasks` (bench-stats/*.R). */
  readonly name: string;
  /** What R does for it, in words. */
  readonly against: string;
  /** Highest ratio of our time to R's that the project allows itself. */
  readonly limit: number;
  /** Rows of three sizes, ascending; the last is compared with R. */
  readonly sizes: readonly [number, number, number];
  /** Rows of the comparison, where R's way cannot manage the last size. */
  readonly comparedSize?: number;
  /** Rows for the memory figure, when the last size is too small to stand out from the runtime itself. */
  readonly memorySize?: number;
  /** Paired runs; fewer for what takes R half a minute. */
  readonly runs: number;
  /** Seeded: the same rows for the same n. */
  data(n: number): Columns;
  /** Columns in the form our function takes; not timed. */
  prepare(columns: Columns): { readonly inputBytes: number; run(): readonly number[] };
  /** Relative tolerance of the answers, number by number. */
  readonly tolerance: number;
}
