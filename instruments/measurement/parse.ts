import { CM_PER_INCH, KG_PER_LB } from '../units';

/** A typed number read, or the reason it was not. `suspicion` is a hint about a readable value, never a refusal; `likely` is what it may have been, in the unit it was asked in. */
export type Parsed<Value> =
  | { readonly ok: true; readonly value: Value; readonly suspicion?: string; readonly likely?: number }
  | { readonly ok: false; readonly reason: string };

const NUMBER = /^[+-]?(\d+([.,]\d*)?|[.,]\d+)$/;
const MINUS_SIGNS = /[\u2212\u2013]/g;

/** '23,6' or ' 23.6 ' to 23.6; null when it is not one plain number (no thousands marks, no exponent). */
export function readDecimal(typed: string): number | null {
  const text = typed.trim().replace(MINUS_SIGNS, '-');
  return NUMBER.test(text) ? Number(text.replace(',', '.')) : null;
}

interface Reading {
  readonly label: string;
  readonly unit: string;
  readonly min: number;
  readonly max: number;
  /** Values outside this are believable only as something else; inside, nothing is suspected. */
  readonly usual: readonly [number, number];
  readonly otherUnit: { readonly name: string; readonly toUnit: number };
  readonly decimals: number;
}

const GIRTH_CM: Reading = { label: 'Girth', unit: 'cm', min: 5, max: 90, usual: [10, 70], otherUnit: { name: 'inches', toUnit: CM_PER_INCH }, decimals: 1 };
const WEIGHT_KG: Reading = { label: 'Weight', unit: 'kg', min: 30, max: 250, usual: [40, 150], otherUnit: { name: 'pounds', toUnit: KG_PER_LB }, decimals: 1 };
const LOAD_KG: Reading = { label: 'Load', unit: 'kg', min: 0, max: 150, usual: [0, 20], otherUnit: { name: 'pounds', toUnit: KG_PER_LB }, decimals: 2 };

/**
 * A girth as typed in centimetres, decimal point or comma, to integer millimetres.
 * '23,6' → 236. Refuses what is no number, what is finer than a millimetre and what no arm measures; hints at inches.
 */
export function parseGirthCm(typed: string): Parsed<number> {
  const read = parseReading(typed, GIRTH_CM);
  return read.ok ? { ...read, value: Math.round(read.value * 10) } : read;
}

/** A weight as typed in kilograms, to at most 0.1 kg; hints at pounds where kilograms are unusual. */
export function parseWeightKg(typed: string): Parsed<number> {
  return parseReading(typed, WEIGHT_KG);
}

/** A load as typed in kilograms, to at most 0.01 kg. */
export function parseLoadKg(typed: string): Parsed<number> {
  return parseReading(typed, LOAD_KG);
}

const ratioLimit = [0.5, 3] as const;
const ratioUsual = [0.85, 1.4] as const;

/** A ratio of two impedances as typed, decimal point or comma, to at most 0.001. */
export function parseImpedanceRatio(typed: string): Parsed<number> {
  const value = readDecimal(typed);
  if (value === null) return { ok: false, reason: notANumber(typed, '1.05') };
  return isUsual(value, ratioLimit) ? { ok: true, value: Math.round(value * 1000) / 1000 } : { ok: false, reason: outsideRatio(value) };
}

/** What is wrong with a ratio beyond its limits, and what it may have been. */
export const outsideRatio = (value: number): string => `You typed ${value}; the ratio lies between ${ratioLimit[0]} and ${ratioLimit[1]}.${wasItShifted(value, ratioUsual)}`;

const notANumber = (typed: string, example: string): string => `‘${typed.trim()}’ is not a number. Type digits and one decimal point or comma, such as ${example}.`;

function parseReading(typed: string, reading: Reading): Parsed<number> {
  if (typed.trim() === '') return { ok: false, reason: `Type the ${reading.label.toLowerCase()} in ${reading.unit}.` };
  const value = readDecimal(typed);
  if (value === null) return { ok: false, reason: notANumber(typed, '23.6') };
  if (value < 0) return { ok: false, reason: `${value} is below zero. Type the ${reading.label.toLowerCase()} without a sign.` };
  if (value > reading.max) return { ok: false, reason: `${value} ${reading.unit} is over the limit of ${reading.max}.${wasItShifted(value, reading.usual)}` };
  if (value < reading.min) return { ok: false, reason: `${value} ${reading.unit} is under the limit of ${reading.min}.${wasItShifted(value, reading.usual)}` };
  if (Math.abs(value * 10 ** reading.decimals - Math.round(value * 10 ** reading.decimals)) > 1e-6) {
    return { ok: false, reason: `${value} has too many decimals. Read it to ${10 ** -reading.decimals} ${reading.unit}.` };
  }
  return { ok: true, value, ...suspect(value, reading) };
}

const isUsual = (value: number, [low, high]: readonly [number, number]): boolean => value >= low && value <= high;
const short = (value: number): number => Math.round(value * 100) / 100;

/** Offers the value with the decimal point one place along, where that would be usual. */
function wasItShifted(value: number, usual: readonly [number, number]): string {
  const shifted = [value / 10, value * 10, value / 100].find((candidate) => isUsual(candidate, usual));
  return shifted === undefined ? ` Measure it again.` : ` Was it ${short(shifted)}?`;
}

function suspect(value: number, reading: Reading): { suspicion?: string; likely?: number } {
  if (isUsual(value, reading.usual)) return {};
  const { name, toUnit } = reading.otherUnit;
  if (isUsual(value * toUnit, reading.usual)) {
    const likely = (value * toUnit).toFixed(1);
    return { suspicion: `${value} ${reading.unit} is unusual. If it was read in ${name}, it is ${likely} ${reading.unit}.`, likely: Number(likely) };
  }
  const shifted = [value / 10, value * 10].find((candidate) => isUsual(candidate, reading.usual));
  return shifted === undefined ? {} : { suspicion: `${value} ${reading.unit} is unusual. Was it ${short(shifted)}?`, likely: short(shifted) };
}
