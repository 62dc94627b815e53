/**
 * Exact conversions. Factors are definitions, not measurements: 1 lb = 0.45359237 kg and
 * 1 in = 2.54 cm (international yard and pound agreement, 1959).
 */
export const KG_PER_LB = 0.45359237;
export const CM_PER_INCH = 2.54;

export type MassUnit = 'kg' | 'lb';

/** Kilograms of a mass typed in `unit`, unrounded. */
export function massToKg(value: number, unit: MassUnit): number {
  return unit === 'lb' ? value * KG_PER_LB : value;
}

/** Pounds of a mass in kilograms, unrounded. */
export function kgToLb(kg: number): number {
  return kg / KG_PER_LB;
}

/** Loads are compared after rounding to a milligram, so that 5 lb typed twice is one load. */
export function roundKg(kg: number): number {
  return Math.round(kg * 1e6) / 1e6;
}

export function inchesToCm(inches: number): number {
  return inches * CM_PER_INCH;
}

/** Body mass index in kg/m². Throws RangeError on a height or weight of zero or less. */
export function bmi({ weightKg, heightCm }: { weightKg: number; heightCm: number }): number {
  if (!(weightKg > 0) || !(heightCm > 0)) throw new RangeError('Weight and height must be above zero.');
  return weightKg / (heightCm / 100) ** 2;
}
