/** Numbers in print: a true minus sign, a thin space for thousands, a fixed number of decimals. */
const MINUS = '\u2212';
const THIN_SPACE = '\u202f';

/** 2089 → '2 089'; -4.04 with one decimal → '−4.0'. Never prints '−0'. */
export function printNumber(value: number, decimals = 0): string {
  const fixed = Math.abs(value).toFixed(decimals);
  const [whole = '0', fraction] = fixed.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+(?!\d))/g, THIN_SPACE);
  const isZero = Number(fixed) === 0;
  return `${value < 0 && !isZero ? MINUS : ''}${grouped}${fraction ? `.${fraction}` : ''}`;
}

/** A change carries its sign: 5.1 → '+5.1', 0 → '0.0'. */
export function printChange(value: number, decimals = 1): string {
  const printed = printNumber(value, decimals);
  return Number(Math.abs(value).toFixed(decimals)) === 0 || value < 0 ? printed : `+${printed}`;
}

/** A girth in millimetres as the reader's centimetres: 236 → '23.6'; a mean of two trials may read 23.65. */
export function printGirthCm(girthMm: number): string {
  return printNumber(girthMm / 10, Number.isInteger(girthMm) ? 1 : 2);
}

/** A load to at most two decimals with idle zeros dropped: 6.40 → '6.4', 2.26796 → '2.27'. */
export function printKg(kg: number): string {
  return String(Number(kg.toFixed(2)));
}
