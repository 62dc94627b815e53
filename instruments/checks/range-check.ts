import { printNumber } from '../numbers';
import { defineEditCheck, type EditCheck, type Uses } from './define-edit-check';

export interface RangeSubject {
  /** Stem of the two ids: 'weight' gives 'weight.limit' and 'weight.range'. */
  readonly stem: string;
  readonly title: string;
  readonly unit: string;
  readonly decimals: number;
  readonly usual: readonly [number, number];
  readonly limit: readonly [number, number];
  readonly uses: Uses;
  readonly source: string;
  /** Words for the soft finding's way out. */
  readonly wayOut?: string;
}

/** The pair of checks most numbers need: a hard limit, and inside it a usual range. Both ends are allowed. */
export function rangeChecks(subject: RangeSubject): { limit: EditCheck<number>; range: EditCheck<number> } {
  const { stem, title, usual, limit, uses, source } = subject;
  const [low, high] = usual;
  const inside = (low + high) / 2;
  return {
    limit: defineEditCheck({
      id: `${stem}.limit`, version: 1, severity: 'hard', uses, title: `${title}: limits`, source,
      run: (value) => overLimit(value, subject),
      examplePass: inside, exampleFires: limit[1] + 10 ** -subject.decimals,
    }),
    range: defineEditCheck({
      id: `${stem}.range`, version: 1, severity: 'soft', uses, title: `${title}: usual range`, source,
      run: (value) => (isWithin(value, limit) ? unusual(value, subject) : null),
      examplePass: inside, exampleFires: high < limit[1] ? high + 10 ** -subject.decimals : low - 10 ** -subject.decimals,
    }),
  };
}

export function isWithin(value: number, [low, high]: readonly [number, number]): boolean {
  return value >= low && value <= high;
}

/** The value with its decimal point one place along, where that lies in the usual range. */
export function shiftedInto(value: number, usual: readonly [number, number]): number | undefined {
  const shifted = [value / 10, value * 10].find((candidate) => isWithin(candidate, usual));
  return shifted === undefined ? undefined : Math.round(shifted * 100) / 100;
}

function overLimit(value: number, { unit, limit, usual, decimals }: RangeSubject) {
  if (isWithin(value, limit)) return null;
  const suggestion = shiftedInto(value, usual);
  const side = value > limit[1] ? `over the limit of ${printNumber(limit[1], whole(limit[1], decimals))}` : `under the limit of ${printNumber(limit[0], whole(limit[0], decimals))}`;
  const wayOut = suggestion === undefined ? 'Check it and type it again.' : `Was it ${suggestion}?`;
  return { message: `${withUnit(value, unit, decimals)} is ${side}. ${wayOut}`, value, ...(suggestion !== undefined && { suggestion }) };
}

function unusual(value: number, { unit, usual, decimals, wayOut = 'Check it, or keep it and say why.' }: RangeSubject) {
  if (isWithin(value, usual)) return null;
  const [low, high] = usual.map((end) => printNumber(end, whole(end, decimals)));
  return { message: `${withUnit(value, unit, decimals)} is outside the usual ${low} to ${high}. ${wayOut}`, value };
}

function withUnit(value: number, unit: string, decimals: number): string {
  return `${printNumber(value, whole(value, decimals))}${unit && ` ${unit}`}`;
}

/** Whole numbers print whole: 741 kg, 74.1 kg. */
function whole(value: number, decimals: number): number {
  return Number.isInteger(value) ? 0 : decimals;
}
