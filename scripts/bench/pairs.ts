/** The middle value; of an even number, the mean of the middle two. */
export function median(values: readonly number[]): number {
  if (values.length === 0) throw new RangeError('No values, no median.');
  const sorted = [...values].sort((a, b) => a - b);
  const half = sorted.length / 2;
  return ((sorted[Math.ceil(half) - 1] as number) + (sorted[Math.floor(half)] as number)) / 2;
}

const timeMs = async (run: () => Promise<unknown>): Promise<number> => {
  const start = performance.now();
  await run();
  return performance.now() - start;
};

/** Times of one way of doing a thing and of another, run in turn. */
export interface Paired {
  readonly oursMs: number;
  readonly floorMs: number;
  readonly ratio: number;
  readonly pairs: number;
}

/**
 * Runs ours and the floor one after the other, `pairs` times after `warmUps` that are not counted. Which of the two goes
 * first changes with every pair, so that neither always finds the data base warmed by the other.
 */
export async function runPairs(options: { pairs: number; warmUps: number; ours(index: number): Promise<unknown>; floor(index: number): Promise<unknown> }): Promise<Paired> {
  const { pairs, warmUps } = options;
  const times: { ours: number; floor: number }[] = [];
  for (let index = 0; index < warmUps + pairs; index += 1) {
    const oursFirst = index % 2 === 0;
    const first = await timeMs(() => (oursFirst ? options.ours(index) : options.floor(index)));
    const second = await timeMs(() => (oursFirst ? options.floor(index) : options.ours(index)));
    if (index >= warmUps) times.push(oursFirst ? { ours: first, floor: second } : { ours: second, floor: first });
  }
  return {
    oursMs: median(times.map(({ ours }) => ours)),
    floorMs: median(times.map(({ floor }) => floor)),
    ratio: median(times.map(({ ours, floor }) => ours / floor)),
    pairs,
  };
}
