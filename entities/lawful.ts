/** A step that the record does not allow now. `lib` turns it into a refusal the person can read. */
export class Unlawful extends Error {
  constructor(
    readonly code: 'locked' | 'conflict' | 'invalid',
    sentence: string,
  ) {
    super(sentence);
    this.name = 'Unlawful';
  }
}

/** Throws Unlawful unless the step is allowed. */
export function lawful(ok: boolean, sentence: string, code: Unlawful['code'] = 'conflict'): asserts ok {
  if (!ok) throw new Unlawful(code, sentence);
}
