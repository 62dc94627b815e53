import { girthMethod, type GirthMethodCode } from './index';
import { FORMULA_VERSION } from './formula-version';
import type { MeasurementMap } from './map';

/** A volume with how it came to be; `volumeMl` is null when a level is missing, and `reason` says which. */
export interface LimbVolume {
  readonly volumeMl: number | null;
  /** Distal to proximal; a segment with a missing end is null. */
  readonly segmentsMl: readonly (number | null)[];
  readonly lengthMm: number;
  readonly method: GirthMethodCode;
  readonly formulaVersion: string;
  readonly reason?: string;
}

type Lengths = { readonly map: MeasurementMap } | { readonly lengthsMm: readonly number[] };

/**
 * Limb volume from girths in millimetres, distal to proximal (`null` = not measured).
 *
 * Give a map of equal steps, or the measured lengths of each segment (the hand). Cones and mean cylinders lie
 * between marks (n girths, n − 1 segments); disks stand at marks (n girths, n disks). Throws RangeError when the
 * number of girths does not fit, or a girth or length is negative or not a number.
 */
export function limbVolume(input: { method: GirthMethodCode; girthsMm: readonly (number | null)[] } & Lengths): LimbVolume {
  const { method, girthsMm } = input;
  const lengthsMm = segmentLengthsMm(input);
  const segmentsMl = lengthsMm.map((lengthMm, segment) => segmentMl({ method, girthsMm, segment, lengthMm }));
  const missing = girthsMm.flatMap((girth, level) => (girth === null ? [level] : []));
  return {
    volumeMl: missing.length === 0 ? segmentsMl.reduce<number>((sum, ml) => sum + (ml ?? 0), 0) : null,
    segmentsMl,
    lengthMm: lengthsMm.reduce((sum, length) => sum + length, 0),
    method,
    formulaVersion: FORMULA_VERSION,
    ...(missing.length > 0 && { reason: missingReason(input, missing) }),
  };
}

function segmentLengthsMm(input: { method: GirthMethodCode; girthsMm: readonly (number | null)[] } & Lengths): readonly number[] {
  const perMark = girthMethod(input.method).segments === 'one per mark';
  const expected = perMark ? input.girthsMm.length : input.girthsMm.length - 1;
  if ('map' in input && input.map.levels !== input.girthsMm.length) {
    throw new RangeError(`The map has ${input.map.levels} levels, but ${input.girthsMm.length} girths were given.`);
  }
  const lengths = 'map' in input ? Array.from({ length: expected }, () => input.map.stepMm) : input.lengthsMm;
  if (expected < 1 || lengths.length !== expected) {
    throw new RangeError(`${input.girthsMm.length} girths need ${Math.max(expected, 1)} lengths, not ${lengths.length}.`);
  }
  if (!lengths.every((length) => length > 0 && Number.isFinite(length))) throw new RangeError('Every length must be above zero.');
  return lengths;
}

function segmentMl({ method, girthsMm, segment, lengthMm }: { method: GirthMethodCode; girthsMm: readonly (number | null)[]; segment: number; lengthMm: number }): number | null {
  const { segments, segmentMm3 } = girthMethod(method);
  const distalMm = girthsMm[segment] ?? null;
  const proximalMm = segments === 'one per mark' ? distalMm : (girthsMm[segment + 1] ?? null);
  if (distalMm === null || proximalMm === null) return null;
  if (!(distalMm >= 0 && proximalMm >= 0) || !Number.isFinite(distalMm + proximalMm)) {
    throw new RangeError(`A girth is a number of zero or more, not ${distalMm} or ${proximalMm}.`);
  }
  return segmentMm3({ distalMm, proximalMm, lengthMm }) / 1000;
}

function missingReason(input: { girthsMm: readonly (number | null)[] } & Lengths, missing: readonly number[]): string {
  const names = missing.map((level) => ('map' in input ? `${(input.map.startOffsetMm + level * input.map.stepMm) / 10} cm` : `level ${level + 1}`));
  return missing.length === 1 ? `The girth at ${names[0]} is missing.` : `Girths are missing at ${names.join(', ')}.`;
}
