import { requireRange } from '../result';

/** A count is a whole number from 0 up. Throws RangeError otherwise. */
export function requireCount(value: number, what: string): void {
  requireRange(Number.isSafeInteger(value) && value >= 0, `${what} is a whole number from 0 up, not ${value}.`);
}

/** Events are counted among n. Throws RangeError when either is no count or events pass n. */
export function requireEvents(events: number, n: number): void {
  requireCount(events, 'The number of events');
  requireCount(n, 'The number observed');
  requireRange(events <= n, `There cannot be ${events} events among ${n}.`);
}

/** Events among n, with a confidence level (0.95 unless given). */
export interface OneGroup {
  readonly events: number;
  readonly n: number;
  readonly level?: number;
}

/** Two independent groups; the estimands compare group 1 with group 2. */
export interface TwoGroups {
  readonly events1: number;
  readonly n1: number;
  readonly events2: number;
  readonly n2: number;
  readonly level?: number;
}

/** A 2 by 2 table: a, b = events and others among the exposed, c, d = among the rest. */
export interface FourfoldTable {
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly d: number;
  readonly level?: number;
}

export function requireTwoGroups({ events1, n1, events2, n2 }: TwoGroups): void {
  requireEvents(events1, n1);
  requireEvents(events2, n2);
}

export function requireTable({ a, b, c, d }: FourfoldTable): void {
  for (const cell of [a, b, c, d]) requireCount(cell, 'A cell of a table');
}

export const NOBODY = 'No one was observed.';
export const NOBODY_IN_A_GROUP = 'A group has no one observed.';
