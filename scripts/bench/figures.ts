/** One line of the table: what we take beside the least it could take, both measured in this run. */
export interface Figure {
  readonly kind: 'ratio';
  readonly part: Part;
  readonly participants: number;
  readonly what: string;
  /** How much it is at this size, where that says more than the number of participants. */
  readonly detail?: string;
  /** What the floor is, in words. */
  readonly floor: string;
  /** Medians over the pairs, in milliseconds. */
  readonly oursMs: number;
  readonly floorMs: number;
  /** Median over the pairs of ours ÷ floor: a shared machine slows both halves of a pair alike. */
  readonly ratio: number;
  readonly pairs: number;
}

/** What one page sends as scripts, compressed as the server sends it. */
export interface PageFigure {
  readonly kind: 'page';
  readonly path: string;
  readonly role: string;
  readonly status: number;
  readonly files: number;
  readonly transferBytes: number;
  readonly rawBytes: number;
}

/** Something that was asked for and could not be measured, with the reason. */
export interface NotRun {
  readonly kind: 'not run';
  readonly part: Part;
  readonly participants: number;
  readonly what: string;
  readonly why: string;
}

export const parts = ['save', 'list', 'today', 'extract', 'pages'] as const;
export type Part = (typeof parts)[number];
export type Told = Figure | PageFigure | NotRun;

/** What every part is given. */
export interface Bench {
  readonly participants: number;
  readonly url: string;
  readonly pairs: number;
  tell(told: Told): void;
}
