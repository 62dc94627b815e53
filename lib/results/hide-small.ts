/** A count as it may be shown: null stands for 'from 1 up to the limit'. Zero may be shown (DEI-16). */
export type ShownCount = number | null;

/** Hides a small count. A limit of 0 hides nothing. */
export const showCount = (count: number, below: number): ShownCount => (count > 0 && count < below ? null : count);

/**
 * Which of the parts of a whole are hidden: the small ones, and the next smallest while those hidden are together still few,
 * because the whole less the parts shown gives what the hidden ones come to.
 */
export function hiddenAmong(parts: readonly number[], below: number): ReadonlySet<number> {
  const places = parts.map((count, place) => ({ count, place })).filter(({ count }) => count > 0).toSorted((a, b) => a.count - b.count || a.place - b.place);
  const hidden = new Set<number>();
  let sum = 0;
  for (const { count, place } of places) {
    if (count >= below && (sum === 0 || sum >= below)) break;
    hidden.add(place);
    sum += count;
  }
  return hidden;
}

export interface CountedReason {
  readonly reason: string;
  readonly count: number;
}

/**
 * Reasons whose counts may be shown beside their total: small ones are put together, and with the next smallest if they are
 * still few, so that no small count can be had by subtraction.
 */
export function foldSmall(reasons: readonly CountedReason[], below: number): { readonly reason: string; readonly count: ShownCount }[] {
  const sorted = reasons.toSorted((a, b) => b.count - a.count || a.reason.localeCompare(b.reason));
  const kept = sorted.filter(({ count }) => count >= below);
  const small = sorted.slice(kept.length);
  if (below === 0 || small.length === 0) return sorted;
  const sum = () => small.reduce((total, { count }) => total + count, 0);
  while (sum() > 0 && sum() < below && kept.length > 0) small.unshift(kept.pop() as CountedReason);
  const names = small.filter(({ count }) => count > 0).map(({ reason }) => reason);
  return [...kept, { reason: names.length > 0 && names.length <= 2 ? names.join(' or ') : 'other reasons', count: showCount(sum(), below) }];
}
