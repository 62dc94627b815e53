import { defineMeasurementMethod, type GirthMethod } from './define-measurement-method';
import { frustumMm3 } from './frustum';

/** Kept apart from the arm: a hand is not a cone, and its volume is never silently added. */
export const handFrustum: GirthMethod = defineMeasurementMethod({
  code: 'hand-frustum',
  name: 'Hand, short cones from styloid to knuckles',
  from: 'girths',
  segments: 'between marks',
  formula: 'V = Σ hᵢ (C₁² + C₁C₂ + C₂²) / 12π, lengths measured',
  source: 'Geometry; levels: ulnar styloid, thumb web, knuckles.',
  segmentMm3: frustumMm3,
  example: { girthsMm: [160, 205, 190], lengthsMm: [50, 40], volumeMl: 257.413226, source: 'clinical-checks VOL-13' },
});
