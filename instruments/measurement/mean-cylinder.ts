import { defineMeasurementMethod, type GirthMethod } from './define-measurement-method';

export const meanCylinder: GirthMethod = defineMeasurementMethod({
  code: 'mean-cylinder',
  name: 'Cylinders of the mean girth',
  from: 'girths',
  segments: 'between marks',
  formula: 'V = Σ h ((C₁ + C₂) / 2)² / 4π',
  source: 'Geometry; lies h(C₁ − C₂)²/48π below the cone in each segment.',
  segmentMm3: ({ distalMm, proximalMm, lengthMm }) => (lengthMm * ((distalMm + proximalMm) / 2) ** 2) / (4 * Math.PI),
  example: {
    girthsMm: [160, 172, 190, 212, 234, 251, 260, 264, 270, 282, 296],
    lengthsMm: Array.from({ length: 10 }, () => 40),
    volumeMl: 1827.61918,
    source: 'clinical-checks VOL-05',
  },
});
