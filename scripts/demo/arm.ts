import { limbVolume } from '@/instruments/measurement/limb-volume';
import { STANDARD_ARM_MAP } from '@/instruments/measurement/map';
import { DOMINANT_ARM_EXCESS_PCT } from '@/instruments/swelling/grading';
import type { Course } from './course';
import type { Draw } from './draw';
import type { Person } from './person';

export type Side = 'left' | 'right';

/** Girths from wrist to armpit of an arm in the middle of things, invented; 0 to 40 cm in steps of 4. */
const middling = [166, 180, 207, 238, 257, 266, 268, 281, 302, 321, 336];

/** Both arms of one person, at any day, before the tape errs. */
export interface Arms {
  trueGirthsMm(side: Side, day: number): number[];
  weightKg(day: number): number;
  impedanceRatio(day: number, draw: Draw): number;
}

/** Smooth along the arm: two slow waves of a person's own. */
function waves(draw: Draw, sd: number): (level: number) => number {
  const [a, b, c] = [draw.normal(0, sd), draw.normal(0, sd), draw.normal(0, sd)];
  return (level) => a * Math.cos((Math.PI * level) / 10) + b * Math.sin((Math.PI * level) / 10) + c * Math.cos((Math.PI * level) / 5);
}

const volumeMl = (girthsMm: readonly number[]): number => limbVolume({ method: 'frustum', girthsMm, map: STANDARD_ARM_MAP }).volumeMl ?? 0;

/** Adds `share` of the volume as a swelling that gathers round one place of the arm. */
function swollen(girthsMm: readonly number[], share: number, place: { centre: number; width: number }): number[] {
  const bump = girthsMm.map((_, level) => Math.exp(-((level - place.centre) ** 2) / (2 * place.width ** 2)));
  const grown = (amountMm: number): number[] => girthsMm.map((girth, level) => girth + amountMm * (bump[level] ?? 0));
  const wanted = volumeMl(girthsMm) * (1 + share);
  let amountMm = 0;
  // Newton with the slope of a small step; volume is all but linear in girth here.
  for (let pass = 0; pass < 3; pass += 1) {
    const at = volumeMl(grown(amountMm));
    const slope = volumeMl(grown(amountMm + 1)) - at;
    amountMm += (wanted - at) / slope;
  }
  return grown(amountMm);
}

export function inventArms(person: Person, course: Course): Arms {
  const draw = person.draw('arm');
  const { facts } = person;
  const bmi = facts.weightKg / (facts.heightMm / 1000) ** 2;
  const size = (facts.heightMm / 1635) ** 0.4 * (bmi / 27.2) ** 0.42 * Math.exp(draw.normal(0, 0.035));
  const own = waves(draw, 0.018);
  const difference = waves(draw, 0.004);
  // Girth goes with the root of volume; the affected arm may already carry a little.
  const dominance = facts.dominantSide === 'both' ? 0 : DOMINANT_ARM_EXCESS_PCT / 200;
  const lean = draw.normal(0, 0.0075);
  const before = facts.cohort === 'swelling' ? draw.uniform(0.09, 0.24) : Math.max(0, draw.normal(0, 0.008));
  const place = { centre: draw.chance(0.55) ? draw.uniform(2.5, 4.5) : draw.uniform(7, 8.8), width: draw.uniform(1.4, 2.4) };
  const gainKgAYear = draw.normal(0.4, 2.2);
  const swing = draw.uniform(0.2, 1.6);
  const phase = draw.uniform(0, 6.28);
  const weightKg = (day: number): number => facts.weightKg + (gainKgAYear * day) / 365 + swing * Math.sin(phase + day / 58);
  const ratioBase = draw.normal(1.0, 0.024);
  return {
    weightKg,
    trueGirthsMm(side, day) {
      const growth = (weightKg(day) / facts.weightKg) ** 0.4;
      const sign = side === 'right' ? 1 : -1;
      const dominant = side === facts.dominantSide ? dominance : -dominance;
      const girths = middling.map((girth, level) => girth * size * growth * (1 + own(level) + sign * (lean + difference(level)) + dominant / 2));
      return side === facts.affectedSide ? swollen(girths, (1 + before) * (1 + course(day)) - 1, place) : girths;
    },
    impedanceRatio: (day, noise) => ratioBase * (1 + 0.55 * before + 0.8 * course(day)) + noise.normal(0, 0.011),
  };
}

/** How a hand reads the tape. */
export interface Hand {
  /** Share of readings rounded to the next half centimetre. */
  readonly roundedShare: number;
  /** Steadier than usual, below 1. */
  readonly noise: number;
}

/** One sitting's error of one arm: where the marks were put that day, as a share of girth. */
export const daysError = (draw: Draw, { noise }: Hand): number => draw.normal(0, 0.0032 * noise);

/** One pass of the tape, in whole millimetres. */
export function readTrial(draw: Draw, trueMm: readonly number[], dayError: number, hand: Hand): number[] {
  const pull = draw.normal(0, 0.0028 * hand.noise);
  return trueMm.map((girth) => {
    const slip = draw.chance(0.005 * hand.noise) ? draw.pick([-1, 1]) * draw.uniform(7, 18) : 0;
    const read = girth * (1 + dayError + pull) + draw.normal(0, 1.3 * hand.noise) + slip;
    return draw.chance(hand.roundedShare) ? Math.round(read / 5) * 5 : Math.round(read);
  });
}
