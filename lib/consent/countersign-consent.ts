import { signByStaff } from '@/entities/consent';
import { ConsentSignatureSchema } from '@/entities/consent-signature';
import { consentCopy } from '@/lib/jobs/handlers/consent-copy';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { addSignature } from './add-signature';
import { contentHash } from './consent-content';
import { findConsent } from './find-consent';
import { findSigner } from './find-signer';
import { sameName } from './same-name';
import { stepOf, type ConsentStep } from './view-consent';

/**
 * The second signature, by the person who took consent, under the name of the account in use. Completes it; the participant's copy goes out.
 * @throws Refusal 'invalid' at 'name' for any other name; 'conflict' when the participant has not signed; 'locked' when what was signed is no longer what stands there.
 */
export async function countersignConsent(work: Work, { id, name }: { id: string; name: string }): Promise<ConsentStep> {
  const { consent, form } = await findConsent(work, id);
  work.expect(consent);
  const signer = await findSigner(work);
  if (!signer.name) throw new Refusal('conflict', 'Your account holds no name to sign with. Ask the administrator to add it.', 'name');
  if (!sameName(name, signer.name)) throw new Refusal('invalid', `You are signed in as ${signer.name}. Sign with that name; somebody else signs in first.`, 'name');
  signByStaff(consent, work.actor.accountId, work.now);
  const contentSha256 = contentHash({ formNumber: form.number, form: form.form, permissions: consent.permissions });
  const first = await work.em.findOneOrFail(ConsentSignatureSchema, { consentId: id, who: 'participant' });
  if (first.contentSha256 !== contentSha256) throw new Refusal('locked', 'The content has changed since the participant signed it. Start the consent again.');
  await addSignature(work, consent, { who: 'staff', means: 'typed', name: signer.name, accountId: work.actor.accountId, contentSha256 });
  await work.em.flush();
  await work.later(consentCopy, { consentId: consent.id, siteId: consent.siteId });
  return stepOf(consent);
}
