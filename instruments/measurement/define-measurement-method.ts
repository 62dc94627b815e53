/** A method that computes volume from girths. `lengthsMm` are the lengths between (or around) the marks. */
export interface GirthMethod {
  readonly code: string;
  readonly name: string;
  readonly from: 'girths';
  /** How many segments a set of girths makes. */
  readonly segments: 'between marks' | 'one per mark';
  readonly formula: string;
  readonly source: string;
  /** Volume of one segment in cubic millimetres. `distalMm` and `proximalMm` are its end girths. */
  segmentMm3(segment: { distalMm: number; proximalMm: number; lengthMm: number }): number;
  readonly example: { readonly girthsMm: readonly number[]; readonly lengthsMm: readonly number[]; readonly volumeMl: number; readonly source: string };
}

/** A method whose device gives the volume itself; it is entered, never recomputed. */
export interface ReadingMethod {
  readonly code: string;
  readonly name: string;
  readonly from: 'reading';
  readonly source: string;
}

export type MeasurementMethod = GirthMethod | ReadingMethod;

/** Types a measurement method; the registry in `index.ts` lists it. */
export function defineMeasurementMethod<const M extends MeasurementMethod>(method: M): M {
  return method;
}
