/** Told of each right-hand value and the left-hand values (from[start] to from[end - 1]) that are above it. */
export type Swaps = (from: Float64Array | Uint32Array, start: number, end: number, value: number) => void;

/** Pairs that stand in the wrong order, counted (and shown, where asked) by a bottom-up merge sort in two arrays as long. */
export function inversions<T extends Float64Array | Uint32Array>(values: T, room: [T, T], show?: Swaps): number {
  const n = values.length;
  let [from, to] = room;
  from.set(values);
  let count = 0;
  for (let width = 1; width < n; width *= 2) {
    for (let left = 0; left < n; left += 2 * width) {
      const middle = Math.min(left + width, n);
      const right = Math.min(left + 2 * width, n);
      let i = left;
      let j = middle;
      for (let k = left; k < right; k++) {
        if (j >= right || (i < middle && from[i]! <= from[j]!)) {
          to[k] = from[i++]!;
          continue;
        }
        if (i < middle) {
          count += middle - i;
          if (show !== undefined) show(from, i, middle, from[j]!);
        }
        to[k] = from[j++]!;
      }
    }
    [from, to] = [to, from];
  }
  return count;
}
