import { defineMeasurementMethod, type GirthMethod } from './define-measurement-method';

export const disk: GirthMethod = defineMeasurementMethod({
  code: 'disk',
  name: 'One disk at each girth',
  from: 'girths',
  segments: 'one per mark',
  formula: 'V = Σ h C² / 4π',
  source: 'Geometry; each mark is the middle of a disk, so the arm is half a step longer at either end than with cones.',
  segmentMm3: ({ distalMm, lengthMm }) => (lengthMm * distalMm ** 2) / (4 * Math.PI),
  example: {
    girthsMm: [160, 172, 190, 212, 234, 251, 260, 264, 270, 282],
    lengthsMm: Array.from({ length: 10 }, () => 40),
    volumeMl: 1730.66677,
    source: 'clinical-checks VOL-04',
  },
});
