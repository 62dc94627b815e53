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
