import { Refusal } from '@/lib/work/refusal';
import type { Found, KeptFinding } from './findings';
import type { CompleteAssessmentInput } from './input';

/** Says by itself why it stands: the protocol changed the marks, not the assessor. */
const explainsItself = (check: string): boolean => check === 'method.changed';

/** The name under which a doubt is asked about, so that a form can answer it: 'keep arms.swapped whole'. */
const asked = ({ check, place }: Pick<Found, 'check' | 'place'>): string => `keep ${check} ${place}`;

export const isSame = (a: Pick<Found, 'check' | 'place'>, b: Pick<Found, 'check' | 'place'>): boolean => a.check === b.check && a.place === b.place;

/**
 * What cannot be right is not saved, whatever is said about it; what is doubtful is kept with its reason.
 * @throws Refusal 'invalid' at the place of what cannot be right, or at every doubt that has no reason yet.
 */
export function requireReasons(found: readonly Found[], kept: CompleteAssessmentInput['kept'], hardField?: string): KeptFinding[] {
  const wrong = found.find(({ severity }) => severity === 'hard');
  if (wrong) throw new Refusal('invalid', wrong.message, hardField ?? wrong.place);
  const explained = found.map((finding) => ({ ...finding, reason: kept.find((one) => isSame(one, finding))?.reason ?? null }));
  const [first, ...others] = explained.filter(({ check, reason }) => reason === null && !explainsItself(check));
  if (first) throw new Refusal('invalid', first.message, asked(first), others.map((one) => ({ field: asked(one), sentence: one.message })));
  return explained;
}
