/**
 * `hint` guides while typing; `soft` can be so and is saved with a reason; `hard` cannot be right and is not saved, whatever
 * the reason. A change since an earlier visit is never hard: the earlier figure may be the wrong one.
 */
export type Severity = 'hint' | 'soft' | 'hard';

/** What a check may look at. While trials are open nothing from earlier visits may guide the hand, so only `this-sitting` checks run. */
export type Uses = 'this-sitting' | 'history';

/** What a check says: the value, the limit and the way out. */
export interface FindingBody {
  readonly message: string;
  /** The value at fault, in the input's own unit. */
  readonly value?: number;
  /** A likely intended value, in the same unit. */
  readonly suggestion?: number;
}

export interface Finding extends FindingBody {
  readonly check: string;
  readonly version: number;
  readonly severity: Severity;
}

export interface EditCheckDefinition<Input> {
  readonly id: string;
  /** Raised when the rule or its limits change; an answered finding does not fire again for the same value and version. */
  readonly version: number;
  readonly severity: Severity;
  readonly uses: Uses;
  /** What the check guards, for the protocol page. */
  readonly title: string;
  readonly source: string;
  run(input: Input): FindingBody | null;
  readonly examplePass: Input;
  readonly exampleFires: Input;
}

/** A check without its input type, as the registry lists it. */
export interface RegisteredCheck {
  readonly id: string;
  readonly version: number;
  readonly severity: Severity;
  readonly uses: Uses;
  readonly title: string;
  readonly source: string;
  /** Runs the two examples the check ships with. */
  runExamples(): { pass: Finding | null; fires: Finding | null };
}

export interface EditCheck<Input> extends RegisteredCheck {
  run(input: Input): Finding | null;
}

/** Types an edit check; the registry in `index.ts` lists it. */
export function defineEditCheck<Input>(definition: EditCheckDefinition<Input>): EditCheck<Input> {
  const { id, version, severity, uses, title, source, examplePass, exampleFires } = definition;
  const run = (input: Input): Finding | null => {
    const body = definition.run(input);
    return body && { check: id, version, severity, ...body };
  };
  return { id, version, severity, uses, title, source, run, runExamples: () => ({ pass: run(examplePass), fires: run(exampleFires) }) };
}
