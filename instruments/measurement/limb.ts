/** One arm at one assessment: its volume, and its girths from wrist upward in millimetres. */
export interface Limb {
  readonly volumeMl: number | null;
  readonly girthsMm: readonly (number | null)[];
}

/** Both arms, named by risk rather than by side. */
export interface LimbPair {
  readonly atRisk: Limb;
  readonly unaffected: Limb;
}
