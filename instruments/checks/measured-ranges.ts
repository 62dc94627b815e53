import { rangeChecks } from './range-check';

const PRACTICE = 'common practice, no source';

export const weight = rangeChecks({ stem: 'weight', title: 'Body weight', unit: 'kg', decimals: 1, usual: [40, 150], limit: [30, 250], uses: 'this-sitting', source: PRACTICE });
export const height = rangeChecks({ stem: 'height', title: 'Height', unit: 'cm', decimals: 0, usual: [145, 185], limit: [120, 210], uses: 'this-sitting', source: PRACTICE });
export const bodyMassIndex = rangeChecks({
  stem: 'body-mass-index', title: 'Body mass index', unit: 'kg/m²', decimals: 1, usual: [16, 50], limit: [12, 80], uses: 'this-sitting',
  source: 'trial cap of 50 in Schmitz 2010; otherwise common practice', wayOut: 'Check weight and height, or keep them and say why.',
});
export const armVolume = rangeChecks({
  stem: 'arm-volume', title: 'Arm volume, about 40 cm', unit: 'mL', decimals: 0, usual: [1200, 5000], limit: [800, 8000], uses: 'this-sitting',
  source: '1270 to 6873 mL observed before surgery, Ancukiewicz 2012, BCRT 135:145', wayOut: 'Look through the girths, or keep them and say why.',
});
export const impedance = rangeChecks({ stem: 'impedance', title: 'Whole-arm impedance R0', unit: 'ohm', decimals: 0, usual: [200, 450], limit: [100, 800], uses: 'this-sitting', source: 'from memory' });
export const impedanceRatioRange = rangeChecks({
  stem: 'impedance-ratio', title: 'Impedance ratio', unit: '', decimals: 3, usual: [0.85, 1.4], limit: [0.5, 3], uses: 'this-sitting',
  source: 'mean 0.987, SD 0.067, Steele 2018, n = 808', wayOut: 'Check that left and right are not swapped, or keep it and say why.',
});
export const interLimbAtBaseline = rangeChecks({
  stem: 'inter-limb-at-baseline', title: 'Inter-limb difference at baseline', unit: '%', decimals: 1, usual: [-10, 10], limit: [-40, 40], uses: 'this-sitting',
  source: PRACTICE, wayOut: 'Look through both arms’ girths, or keep them and say why.',
});

