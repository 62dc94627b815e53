import { signByParticipant } from '@/entities/consent';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { addSignature } from './add-signature';
import { contentHash } from './consent-content';
import { checkPermissions, checkStatements, findConsent } from './find-consent';
import type { SignConsentInput } from './input';
import { stepOf, type ConsentStep } from './view-consent';

/**
 * The participant signs, on the clinic's tablet once it was handed over, or at home. Uses up every link of this screening.
 *
 * The typed name is kept as it was typed and is not compared with the name on record: that one may be misspelt or a
 * maiden name, and a refusal would tell it to whoever holds the link. Who signs second sees both names side by side.
 * @throws Refusal 'invalid' for an unread part, an unticked statement or an open permission; 'conflict' when signed already.
 */
export async function signConsent(work: Work, { id, statements, permissions, signature }: SignConsentInput): Promise<ConsentStep> {
  const { consent, form } = await findConsent(work, id);
  const expectedMode = work.actor.atTablet ? 'tablet' : 'home';
  if (consent.mode !== expectedMode) throw new Refusal('conflict', 'This consent is now read and signed in another way. Ask your site.');
  checkStatements(form, statements);
  checkPermissions(form, permissions);
  consent.permissions = permissions;
  signByParticipant(consent, { sections: form.form.sections.map(({ key }) => key), permissions: form.form.permissions.map(({ key }) => key) }, work.now);
  await addSignature(work, consent, {
    who: 'participant',
    means: signature.kind,
    ...(signature.kind === 'typed' ? { name: signature.name } : { drawing: JSON.stringify({ path: signature.path, width: signature.width, height: signature.height }) }),
    contentSha256: contentHash({ formNumber: form.number, form: form.form, permissions }),
  });
  await work.em.flush();
  await work.sql(`update invitation set used_at = ?, version = version + 1 where kind = 'consent' and screening_id = ? and used_at is null`, [work.now, consent.screeningId]);
  return stepOf(consent);
}
