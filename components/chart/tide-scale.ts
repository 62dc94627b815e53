import { scaleLinear, type ScaleLinear } from 'd3-scale';
import { dayNumber } from './days';
import type { TideData } from './tide-data';

/** Geometry of the tide chart, pixels of its 1328 wide field. */
export const field = {
  width: 1328,
  left: 160,
  right: 1320,
  armTop: 52,
  armFoot: 266,
  loadTop: 374,
  loadFoot: 520,
  symptomY: 338,
  windowY: 584,
} as const;

export interface TideScale {
  /** Pixel of a day's start. */
  x: (day: string) => number;
  /** Pixels of one day. */
  dayWidth: number;
  today: number;
  change: ScaleLinear<number, number>;
  /** Percent at the edges of the staff's segments. */
  changeEdges: readonly number[];
  load: ScaleLinear<number, number>;
  loadEdges: readonly number[];
}

/** Scales wide enough for every value: the arm never leaves its staff, at least −4 to +12 %. */
export function tideScale(data: TideData): TideScale {
  const first = dayNumber(data.from);
  const days = dayNumber(data.to) - first;
  if (days <= 0) throw new RangeError('A tide chart runs from an earlier day to a later one.');
  const dayWidth = (field.right - field.left) / days;
  const x = (day: string) => field.left + (dayNumber(day) - first) * dayWidth;
  const values = data.visits.flatMap(({ changePercent, trialsPercent }) => [changePercent ?? 0, ...(trialsPercent ?? [])]);
  const low = Math.min(-4, ...values);
  const high = Math.max(12, data.threshold.percent + 2, ...values);
  const changeEdges = edges(low, high, high - low > 28 ? 5 : 2);
  const heaviest = Math.max(1, ...data.weeks.map(({ loadsKg }) => loadsKg.reduce((sum, load) => sum + load, 0)));
  const loadEdges = edges(0, heaviest, niceStep(heaviest / 4));
  return {
    x,
    dayWidth,
    today: x(data.today) + dayWidth / 2,
    change: scaleLinear([changeEdges[0] ?? 0, changeEdges.at(-1) ?? 1], [field.armFoot, field.armTop]),
    changeEdges,
    load: scaleLinear([0, loadEdges.at(-1) ?? 1], [field.loadTop, field.loadFoot]),
    loadEdges,
  };
}

/** Multiples of `step` from at or under `low` to at or over `high`. */
export function edges(low: number, high: number, step: number): number[] {
  const from = Math.floor(low / step);
  const to = Math.max(from + 1, Math.ceil(high / step));
  return Array.from({ length: to - from + 1 }, (_, index) => (from + index) * step);
}

/** 1, 2, 2.5 or 5 times a power of ten, at or over the value. */
export function niceStep(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  const step = [1, 2, 2.5, 5, 10].find((one) => one * power >= value - 1e-9) ?? 10;
  return step * power;
}
