import { handOver } from '@/lib/auth/hand-over';
import { may } from '@/lib/auth/policy';
import type { Actor } from '@/lib/auth/roles';
import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';
import { viewScreeningConsent } from './view-consent';

/**
 * Hands the tablet over for the consent of one screening, by somebody who takes consent there.
 * @throws Refusal 'forbidden' for every other role, 'not-found' out of reach, 'conflict' when it is not read on a tablet.
 */
export async function handOverForConsent(actor: Actor, token: string, screeningId: string): Promise<{ handedOver: true }> {
  if (!may(actor.role, 'consent.start')) throw new Refusal('forbidden', 'Your role does not include this.');
  const consent = await withWork(actor, 'consent.view', (work) => viewScreeningConsent(work, { screeningId }));
  if (!consent) throw new Refusal('not-found', 'There is no consent to read here.');
  if (consent.mode !== 'tablet' || consent.state !== 'reading') throw new Refusal('conflict', 'This consent is not read on the tablet now.');
  await handOver(token, { screeningId, siteId: consent.siteId });
  return { handedOver: true };
}
