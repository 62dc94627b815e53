import { ConsentSchema, type Consent } from '@/entities/consent';
import { ConsentSignatureSchema } from '@/entities/consent-signature';
import { SiteSchema } from '@/entities/site';
import type { ConsentForm } from '@/lib/protocol/document';
import { findConsentForm } from '@/lib/protocol/find-protocol';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** A consent as its readers and signers see it. */
export interface ConsentView {
  readonly id: string;
  readonly version: number;
  readonly screeningId: string;
  readonly siteId: string;
  readonly mode: Consent['mode'];
  readonly state: Consent['state'];
  readonly formNumber: string;
  readonly form: ConsentForm;
  readonly sectionsRead: readonly string[];
  readonly permissions: Readonly<Record<string, 'yes' | 'no'>>;
  readonly hasPaperForm: boolean;
  readonly hasCopy: boolean;
  readonly participantSignedAt: Date | null;
  readonly staffSignedAt: Date | null;
  readonly signatures: readonly { readonly who: 'participant' | 'staff'; readonly means: string; readonly name: string; readonly signedAt: Date; readonly contentSha256: string }[];
  readonly site: { readonly name: string; readonly phone: string; readonly email: string; readonly timeZone: string };
}

/** What a step of consent gives back: no names, because answers to creates are kept for replay. */
export interface ConsentStep {
  readonly id: string;
  readonly version: number;
  readonly mode: Consent['mode'];
  readonly state: Consent['state'];
}

/** The step that was just taken, after a flush. */
export const stepOf = ({ id, version, mode, state }: Consent): ConsentStep => ({ id, version, mode, state });

async function viewOf(work: Work, consent: Consent): Promise<ConsentView> {
  const [form, site, signatures] = [
    await findConsentForm(work, consent.formVersionId),
    await work.em.findOneOrFail(SiteSchema, { id: consent.siteId }),
    await work.em.find(ConsentSignatureSchema, { consentId: consent.id }, { orderBy: { signedAt: 'asc' } }),
  ];
  return {
    id: consent.id,
    version: consent.version,
    screeningId: consent.screeningId,
    siteId: consent.siteId,
    mode: consent.mode,
    state: consent.state,
    formNumber: form.number,
    form: form.form,
    sectionsRead: consent.sectionsRead,
    permissions: consent.permissions,
    hasPaperForm: consent.paperFileId != null,
    hasCopy: consent.copyFileId != null,
    participantSignedAt: consent.participantSignedAt ?? null,
    staffSignedAt: consent.staffSignedAt ?? null,
    signatures: signatures.map(({ who, means, name, signedAt, contentSha256 }) => ({ who, means, name, signedAt, contentSha256 })),
    site: { name: site.name, phone: site.phone, email: site.email, timeZone: site.timeZone },
  };
}

/** One consent in reach. @throws Refusal 'not-found'. */
export async function viewConsent(work: Work, { id }: { id: string }): Promise<ConsentView> {
  const consent = await work.em.findOne(ConsentSchema, { id });
  if (!consent) throw new Refusal('not-found', 'There is no such consent.');
  return viewOf(work, consent);
}

/** The consent of a screening that counts now: the newest that was not set aside. Null before one was begun. */
export async function viewScreeningConsent(work: Work, { screeningId }: { screeningId: string }): Promise<ConsentView | null> {
  const [consent] = await work.em.find(ConsentSchema, { screeningId, state: { $ne: 'set aside' } }, { orderBy: { createdAt: 'desc' }, limit: 1 });
  return consent ? viewOf(work, consent) : null;
}

/** What the participant agreed to: the own consent that is complete. @throws Refusal 'not-found' when there is none. */
export async function viewMyConsent(work: Work): Promise<ConsentView> {
  const participantId = work.actor.participantId;
  const [consent] = participantId
    ? await work.em.find(ConsentSchema, { participantId, state: 'complete' }, { orderBy: { staffSignedAt: 'desc' }, limit: 1 })
    : [];
  if (!consent) throw new Refusal('not-found', 'There is no consent of yours here.');
  return viewOf(work, consent);
}
