export interface Statistic {
  /** The exported function's name. */
  readonly name: string;
  /** The method as a reader would cite it. */
  readonly method: string;
  /** Where the method is published. */
  readonly reference: string;
}

/** Keeps the name literal, so that `methodOf` knows the names there are. */
export function defineStatistic<const S extends Statistic>(statistic: S): S {
  return statistic;
}
