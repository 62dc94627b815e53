import type { Provenance } from '../result';

/** A model that the data cannot carry, and why. */
export interface Refusal extends Provenance {
  readonly fitted: false;
  readonly reason: string;
}
