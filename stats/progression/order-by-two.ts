import { pickRows } from '../missing/usable-rows';
import { orderOf } from '../survival/sort';

/** Rows in order of the first column, equal ones in order of the second, equal ones as they came; O(n). */
export function orderByTwo(first: Float64Array, second: Float64Array): Uint32Array {
  const bySecond = orderOf(second);
  const keys = new Float64Array(first.length);
  for (let k = 0; k < keys.length; k++) keys[k] = first[bySecond[k]!]!;
  const order = orderOf(keys);
  for (let k = 0; k < order.length; k++) order[k] = bySecond[order[k]!]!;
  return order;
}

/** Two columns by the first, then the second; the very columns where they stand so already. */
export function inOrderByTwo(x: Float64Array, y: Float64Array): { readonly x: Float64Array; readonly y: Float64Array } {
  let row = 1;
  while (row < x.length && (x[row - 1]! < x[row]! || (x[row - 1] === x[row] && y[row - 1]! <= y[row]!))) row++;
  if (row >= x.length) return { x, y };
  const order = orderByTwo(x, y);
  return { x: pickRows(x, order), y: pickRows(y, order) };
}
