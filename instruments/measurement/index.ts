import type { GirthMethod, MeasurementMethod } from './define-measurement-method';
import { disk } from './disk';
import { frustum } from './frustum';
import { handFrustum } from './hand-frustum';
import { meanCylinder } from './mean-cylinder';
import { optical } from './optical';
import { water } from './water';

/** Every measurement method, in alphabetical order of code. */
export const measurementMethods: readonly MeasurementMethod[] = [disk, frustum, handFrustum, meanCylinder, optical, water];

export type MeasurementMethodCode = 'disk' | 'frustum' | 'hand-frustum' | 'mean-cylinder' | 'optical' | 'water';

/** Codes of the methods that compute from girths. */
export type GirthMethodCode = 'disk' | 'frustum' | 'hand-frustum' | 'mean-cylinder';

const girthMethods: Readonly<Record<GirthMethodCode, GirthMethod>> = {
  disk,
  frustum,
  'hand-frustum': handFrustum,
  'mean-cylinder': meanCylinder,
};

export function girthMethod(code: GirthMethodCode): GirthMethod {
  return girthMethods[code];
}
