import type { ExtractColumn } from './define-extract-file';

export type Cell = number | string | null;

/** Begins with a letter or digit: a spreadsheet reads what begins with a dash as a formula. */
const plainKey = /^[a-z0-9][a-z0-9.-]{0,59}$/i;
const studyNumber = /^P\d{7}$/;

/**
 * One cell as it may leave: a number, a word of the column's list, or nothing. What does not fit is blanked, so that words
 * typed where a code belongs can never get out.
 */
export function cleanCell({ kind, codes = [] }: ExtractColumn, value: unknown): Cell {
  if (value === null || value === undefined) return null;
  if (kind === 'integer' || kind === 'number') return typeof value === 'number' && Number.isFinite(value) && (kind === 'number' || Number.isInteger(value)) ? value : null;
  if (kind === 'yes or no') return value === true ? 'yes' : value === false ? 'no' : null;
  if (typeof value !== 'string') return null;
  const fits = kind === 'code' ? codes.includes(value) : (kind === 'key' ? plainKey : studyNumber).test(value);
  return fits ? value : null;
}
