import { changeMode, ConsentSchema, setAside, type Consent } from '@/entities/consent';
import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import { ScreeningSchema } from '@/entities/screening';
import { SiteSchema } from '@/entities/site';
import { consentLink } from '@/lib/jobs/handlers/consent-link';
import { currentConsentForm } from '@/lib/protocol/find-protocol';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import type { ConsentMode } from './input';
import { stepOf, type ConsentStep } from './view-consent';

/** A link needs an address to go to. */
async function sendLink(work: Work, { screeningId, siteId }: { screeningId: string; siteId: string }): Promise<void> {
  const identity = await work.em.findOne(ParticipantIdentitySchema, { screeningId });
  if (!identity?.email) throw new Refusal('invalid', 'There is no e-mail address to send the link to. Add it to the contact details first.', 'email');
  await work.later(consentLink, { screeningId, siteId });
}

/** A consent on the form of today: an open one goes on, in the new way; one on an older form is set aside. */
async function openConsent(work: Work, { screeningId, siteId, mode, open, formId }: { screeningId: string; siteId: string; mode: ConsentMode; open: Consent | null; formId: string }): Promise<Consent> {
  if (open?.formVersionId === formId) {
    changeMode(open, mode);
    return open;
  }
  if (open) {
    setAside(open);
    await work.em.flush();
  }
  return work.em.create(ConsentSchema, {
    screeningId,
    siteId,
    participantId: null,
    formVersionId: formId,
    mode,
    state: 'reading',
    sectionsRead: [],
    permissions: {},
    paperFileId: null,
    paperSignedOn: null,
    participantSignedAt: null,
    staffSignedAt: null,
    staffSignedBy: null,
    copyFileId: null,
    createdAt: work.now,
  });
}

/**
 * Begins consent in one of three ways, or goes on in another one. For 'home', a link goes out by mail.
 * @throws Refusal 'conflict' when the screening has ended or the consent is signed already.
 */
export async function startConsent(work: Work, { id, mode }: { id: string; mode: ConsentMode }): Promise<ConsentStep> {
  const screening = await work.em.findOne(ScreeningSchema, { id });
  if (!screening) throw new Refusal('not-found', 'There is no such screening.');
  if (screening.state !== 'screening') throw new Refusal('conflict', 'This screening has already ended.');
  const standing = await work.em.find(ConsentSchema, { screeningId: id, state: { $ne: 'set aside' } }, { orderBy: { createdAt: 'desc' } });
  if (standing.some(({ state }) => state !== 'reading')) throw new Refusal('conflict', 'This consent is already signed.');
  const site = await work.em.findOneOrFail(SiteSchema, { id: screening.siteId });
  const form = await currentConsentForm(work, site.timeZone);
  const consent = await openConsent(work, { screeningId: id, siteId: screening.siteId, mode, open: standing[0] ?? null, formId: form.id });
  await work.em.flush();
  if (mode === 'home') await sendLink(work, { screeningId: id, siteId: screening.siteId });
  return stepOf(consent);
}

/** Sends a new link for reading at home; the one before stops working. */
export async function sendConsentLink(work: Work, { id }: { id: string }): Promise<{ queued: true }> {
  const consent = await work.em.findOne(ConsentSchema, { id });
  if (!consent) throw new Refusal('not-found', 'There is no such consent.');
  if (consent.state !== 'reading' || consent.mode !== 'home') throw new Refusal('conflict', 'A link is sent only for a consent that is read at home and not yet signed.');
  await sendLink(work, { screeningId: consent.screeningId, siteId: consent.siteId });
  return { queued: true };
}
