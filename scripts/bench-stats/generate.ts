/** Seeded input: follow-up with competing causes and five covariates, and onsets between visits. */
import { nextDouble, type RandomSource } from '@/stats/random/source';
import { Xoshiro128 } from '@/stats/random/xoshiro128';
import type { Columns } from './task';

class Draw {
  constructor(private readonly source: RandomSource) {}

  uniform(): number {
    return nextDouble(this.source) + 2 ** -54; // never 0
  }

  normal(): number {
    return Math.sqrt(-2 * Math.log(this.uniform())) * Math.cos(2 * Math.PI * this.uniform());
  }
}

const made = new Map<string, Columns>();

function remember(key: string, make: () => Columns): Columns {
  const known = made.get(key);
  if (known) return known;
  const columns = make();
  made.set(key, columns);
  return columns;
}

/** About 31% with the event, 8% with another cause, the rest censored; `day` in whole days (heavy ties), `time` continuous. */
export function followUpColumns(n: number): Columns {
  return remember(`follow-up ${n}`, () => {
    const draw = new Draw(Xoshiro128.fromSeed(13));
    const column = () => new Float64Array(n);
    const out = { day: column(), time: column(), cause: column(), group: column(), site: column(), x1: column(), x2: column(), x3: column(), x4: column(), x5: column() };
    const frailty = Array.from({ length: 40 }, () => 0.25 * draw.normal());
    for (let i = 0; i < n; i++) {
      const x = [draw.normal(), draw.uniform() < 0.4 ? 1 : 0, 57 + 11 * draw.normal(), 27 + 4.5 * draw.normal(), draw.uniform() < 0.3 ? 1 : 0] as const;
      const group = Math.floor(4 * draw.uniform());
      const site = Math.floor(40 * draw.uniform());
      const eta = 0.3 * x[0] - 0.4 * x[1] + 0.01 * (x[2] - 57) + 0.05 * (x[3] - 27) + 0.6 * x[4] + 0.1 * group + frailty[site]!;
      const onset = 2500 * (-Math.log(draw.uniform()) * Math.exp(-eta)) ** 0.8;
      const other = -Math.log(draw.uniform()) * 9000 * Math.exp(-0.02 * (x[2] - 57));
      const end = 180 + 1640 * draw.uniform();
      const time = Math.min(onset, other, end);
      [out.time[i], out.day[i], out.cause[i]] = [time, Math.max(1, Math.ceil(time)), time === onset ? 1 : time === other ? 2 : 0];
      [out.group[i], out.site[i]] = [group, site];
      [out.x1[i], out.x2[i], out.x3[i], out.x4[i], out.x5[i]] = x;
    }
    return out;
  });
}

/** Onset looked for at about three-monthly visits, two weeks early or late, one in eight missed; days. */
export function onsetColumns(n: number): Columns {
  return remember(`onset ${n}`, () => {
    const draw = new Draw(Xoshiro128.fromSeed(22));
    const [left, right] = [new Float64Array(n), new Float64Array(n)];
    for (let i = 0; i < n; ) {
      const onset = 1500 * (-Math.log(draw.uniform())) ** (1 / 1.2);
      const stays = 1 + 19 * draw.uniform();
      let [l, r] = [0, Infinity];
      for (let visit = 1; visit <= stays; visit++) {
        const day = Math.round(91 * visit + 28 * (draw.uniform() - 0.5));
        if (draw.uniform() < 0.125 || r < Infinity) continue;
        if (day < onset) l = day;
        else r = day;
      }
      if (l === 0 && r === Infinity) continue;
      [left[i], right[i]] = [l, r];
      i++;
    }
    return { left, right };
  });
}
