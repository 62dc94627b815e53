import { defineMeasurementMethod } from './define-measurement-method';

export const water = defineMeasurementMethod({
  code: 'water',
  name: 'Water displacement reading',
  from: 'reading',
  source: 'Entered as read; never compared with another method.',
});
