import { signByParticipant } from '@/entities/consent';
import { plainDate } from '@/lib/people/plain-date';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { addSignature } from './add-signature';
import { contentHash } from './consent-content';
import { checkPermissions, checkStatements, findConsent } from './find-consent';
import { stepOf, type ConsentStep } from './view-consent';

/**
 * Records what stands on the signed paper form, once the form itself was received. The second signature follows as usual.
 * @throws Refusal 'invalid' for a date to come or before the form was in effect; 'conflict' without the form.
 */
export async function recordPaperSignature(
  work: Work,
  { id, signedOn, statements, permissions }: { id: string; signedOn: string; statements: readonly string[]; permissions: Record<string, 'yes' | 'no'> },
): Promise<ConsentStep> {
  const { consent, form, site } = await findConsent(work, id);
  work.expect(consent);
  if (consent.mode !== 'paper' || !consent.paperFileId) throw new Refusal('conflict', 'Add the signed form first.', 'file');
  if (signedOn > localDate(work.now, site.timeZone)) throw new Refusal('invalid', `${plainDate(signedOn)} is still to come. Give the day that stands beside the signature.`, 'signedOn');
  if (signedOn < form.effectiveOn) throw new Refusal('invalid', `Form ${form.number} is in effect from ${plainDate(form.effectiveOn)}, so it was not signed before that. Check the day and the year.`, 'signedOn');
  checkStatements(form, statements);
  checkPermissions(form, permissions);
  consent.permissions = permissions;
  consent.paperSignedOn = signedOn;
  // On paper, reading cannot be followed; the signature beside the statements stands for it.
  consent.sectionsRead = form.form.sections.map(({ key }) => key);
  signByParticipant(consent, { sections: consent.sectionsRead, permissions: form.form.permissions.map(({ key }) => key) }, work.now);
  await addSignature(work, consent, { who: 'participant', means: 'paper', contentSha256: contentHash({ formNumber: form.number, form: form.form, permissions }) });
  await work.em.flush();
  return stepOf(consent);
}
