import { inviteeOf, type PresentedLink } from '@/lib/auth/invitee';
import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';
import { viewScreeningConsent, type ConsentView } from './view-consent';

/**
 * What the holder of a consent link reads. Looking uses nothing up: mail scanners look too.
 * @throws Refusal 'expired' for a link that may not be used, or when nothing waits to be signed at home.
 */
export async function openConsentLink(link: PresentedLink): Promise<ConsentView> {
  const actor = await inviteeOf(link);
  const consent = await withWork(actor, 'consent.view', (work) => viewScreeningConsent(work, { screeningId: actor.screeningId ?? '' }));
  if (consent?.mode !== 'home' || consent.state !== 'reading') throw new Refusal('expired', 'Nothing waits for you to sign here. Ask your site if you are unsure.');
  return consent;
}
