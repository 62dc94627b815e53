/** Numbers in print: a true minus sign, a thin space for thousands, a fixed number of decimals. */
const MINUS = '\u2212';
const THIN_SPACE = '\u202f';

/** The figure with its decimal point moved, digit by digit: no factor is multiplied, so 0.285 becomes 28.5 and not 28.499999999999996. */
function movePoint(value: number, places: number): number {
  const [digits = '0', exponent = '0'] = String(value).split('e');
  return Number(`${digits}e${Number(exponent) + places}`);
}

/** A proportion as percent, exactly as its digits say: 0.285 → 28.5. */
export const percentOf = (proportion: number): number => movePoint(proportion, 2);

/**
 * Rounds the figure as it is written, halves away from zero: 22.85 → 22.9, 26.65 → 26.7, −0.25 → −0.3.
 * `toFixed` rounds the binary fraction behind the figure, which sends halves either way.
 */
export function roundHalfAway(value: number, decimals: number): number {
  const size = movePoint(Math.round(movePoint(Math.abs(value), decimals)), -decimals);
  return value < 0 && size !== 0 ? -size : size;
}

/** The digits of a figure without its sign, with a fixed number of decimals. */
export const fixedDigits = (value: number, decimals: number): string => Math.abs(roundHalfAway(value, decimals)).toFixed(decimals);

/** 2089 → '2 089'; -4.04 with one decimal → '−4.0'. Never prints '−0'. */
export function printNumber(value: number, decimals = 0): string {
  const fixed = fixedDigits(value, decimals);
  const [whole = '0', fraction] = fixed.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+(?!\d))/g, THIN_SPACE);
  const isZero = Number(fixed) === 0;
  return `${value < 0 && !isZero ? MINUS : ''}${grouped}${fraction ? `.${fraction}` : ''}`;
}

/** A change carries its sign: 5.1 → '+5.1', 0 → '0.0'. */
export function printChange(value: number, decimals = 1): string {
  const printed = printNumber(value, decimals);
  return value < 0 || roundHalfAway(value, decimals) === 0 ? printed : `+${printed}`;
}

/** A girth in millimetres as the reader's centimetres: 236 → '23.6'; a mean of two trials may read 23.65, exactly, since it is held against a line. */
export function printGirthCm(girthMm: number): string {
  return printNumber(girthMm / 10, Number.isInteger(girthMm) ? 1 : 2);
}

/** A load to at most two decimals with idle zeros dropped: 6.40 → '6.4', 2.26796 → '2.27'. */
export function printKg(kg: number): string {
  return String(roundHalfAway(kg, 2));
}
