/** Why a request was refused. One map to HTTP numbers stands in lib/web/problem.ts. */
export type RefusalCode =
  | 'unauthenticated'
  | 'forbidden'
  | 'not-found'
  | 'invalid'
  | 'conflict'
  | 'stale'
  | 'locked'
  | 'expired'
  | 'too-many'
  | 'too-large'
  | 'precondition-required';

/** A refusal the person can read and act on. Anything else thrown is a fault of ours. */
export class Refusal extends Error {
  constructor(
    readonly code: RefusalCode,
    /** A sentence for the person: what is wrong, with the value, then the way out. */
    readonly sentence: string,
    /** The field it is about, where there is one. */
    readonly field?: string,
    /** Further things to answer at once, each at its field. */
    readonly beside: readonly { readonly field: string; readonly sentence: string }[] = [],
  ) {
    super(sentence);
    this.name = 'Refusal';
  }
}
