import { ConsentSchema, type Consent } from '@/entities/consent';
import { SiteSchema, type Site } from '@/entities/site';
import { findConsentForm, type ConsentFormView } from '@/lib/protocol/find-protocol';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** A consent in reach, with its form and site. @throws Refusal 'not-found'. */
export async function findConsent(work: Work, id: string): Promise<{ consent: Consent; form: ConsentFormView; site: Site }> {
  const consent = await work.em.findOne(ConsentSchema, { id });
  if (!consent) throw new Refusal('not-found', 'There is no such consent.');
  const site = await work.em.findOneOrFail(SiteSchema, { id: consent.siteId });
  return { consent, form: await findConsentForm(work, consent.formVersionId), site };
}

/** A permission that the form does not ask for is refused; one that is missing is named by the entity. */
export function checkPermissions(form: ConsentFormView, permissions: Readonly<Record<string, 'yes' | 'no'>>): void {
  const asked = form.form.permissions.map(({ key }) => key);
  if (Object.keys(permissions).some((key) => !asked.includes(key))) throw new Refusal('invalid', 'The form does not ask for that permission.', 'permissions');
}

/** Every statement of the form must have been ticked. */
export function checkStatements(form: ConsentFormView, ticked: readonly string[]): void {
  const missing = form.form.statements.filter(({ key }) => !ticked.includes(key));
  if (missing.length > 0) throw new Refusal('invalid', `Tick what you agree to: ${missing.length === 1 ? 'one statement is' : `${missing.length} statements are`} not ticked.`, 'statements');
}
