import { defineMeasurementMethod, type GirthMethod } from './define-measurement-method';

/** Volume of a truncated cone from its end girths. */
export function frustumMm3({ distalMm, proximalMm, lengthMm }: { distalMm: number; proximalMm: number; lengthMm: number }): number {
  return (lengthMm * (distalMm ** 2 + distalMm * proximalMm + proximalMm ** 2)) / (12 * Math.PI);
}

export const frustum: GirthMethod = defineMeasurementMethod({
  code: 'frustum',
  name: 'Truncated cones between girths',
  from: 'girths',
  segments: 'between marks',
  formula: 'V = Σ h (C₁² + C₁C₂ + C₂²) / 12π',
  source: 'Geometry; each mark is a boundary between two segments.',
  segmentMm3: frustumMm3,
  example: { girthsMm: [160, 200], lengthsMm: [40], volumeMl: 103.556816, source: 'clinical-checks VOL-02' },
});
