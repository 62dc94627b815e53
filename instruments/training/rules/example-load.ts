import type { ArmState, LoadFacts } from '../define-training-rule';
import { loadFacts } from '../load-facts';
import { defaultTrainingSettings } from '../settings';

/** A worked example's history written short: loads by date, the last one being judged. Kilograms, arm clear unless said. */
export function exampleLoad(loads: Readonly<Record<string, number>>, arm: ArmState = 'clear'): LoadFacts {
  const history = Object.entries(loads).map(([on, load]) => ({ on, load }));
  const judged = history.at(-1);
  if (!judged) throw new RangeError('An example needs at least one load.');
  return loadFacts({ ...judged, isBand: false, arm, past: history.slice(0, -1) }, defaultTrainingSettings);
}
