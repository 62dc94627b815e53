import { defineMeasurementMethod } from './define-measurement-method';

export const optical = defineMeasurementMethod({
  code: 'optical',
  name: 'Optical volumeter reading',
  from: 'reading',
  source: 'Entered as the device gives it; its limits of agreement with tape are as wide as a 200 mL definition, so the two are never compared.',
});
