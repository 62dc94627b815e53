import { createHash } from 'node:crypto';
import { ConsentSchema } from '@/entities/consent';
import { ConsentSignatureSchema } from '@/entities/consent-signature';
import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import { StoredFileSchema } from '@/entities/stored-file';
import type { Work } from '@/lib/work/work';
import type { ConsentPrint, PrintedSignature } from './consent-pdf';
import { staffStatement } from './input';
import { viewConsent } from './view-consent';

/** What a participant's copy needs: what to print, or the file that is there already, and where it goes. */
export interface CopyToMake {
  readonly print: ConsentPrint;
  /** Set once a copy is kept: the mail alone is left to do. */
  readonly kept: { readonly storageKey: string; readonly contentType: string } | null;
  readonly to: string | null;
  readonly name: string;
  readonly siteName: string;
}

/** Reads everything for the copy of a complete consent. On paper, the copy is the signed form itself. */
export async function readCopy(work: Work, consentId: string): Promise<CopyToMake | null> {
  const consent = await work.em.findOneOrFail(ConsentSchema, { id: consentId });
  if (consent.state !== 'complete') return null;
  if (consent.mode === 'paper' && !consent.copyFileId) {
    consent.copyFileId = consent.paperFileId ?? null;
    await work.em.flush();
  }
  const file = consent.copyFileId ? await work.em.findOne(StoredFileSchema, { id: consent.copyFileId }) : null;
  const signatures = await work.em.find(ConsentSignatureSchema, { consentId }, { orderBy: { signedAt: 'asc' } });
  const identity = await work.em.findOne(ParticipantIdentitySchema, { screeningId: consent.screeningId });
  const view = await viewConsent(work, { id: consentId });
  return {
    print: {
      consent: view,
      signatures: signatures.map(({ who, means, name, signedAt, contentSha256, drawing }) => ({
        who,
        means,
        name,
        signedAt,
        contentSha256,
        drawing: drawing ? (JSON.parse(drawing) as PrintedSignature['drawing']) : null,
      })),
      staffStatement,
    },
    kept: file ? { storageKey: file.storageKey, contentType: file.contentType } : null,
    to: identity?.email ?? null,
    name: identity?.name ?? '',
    siteName: view.site.name,
  };
}

/** Joins a stored copy to its consent. */
export async function joinCopy(work: Work, { consentId, storageKey, content }: { consentId: string; storageKey: string; content: Buffer }): Promise<void> {
  const consent = await work.em.findOneOrFail(ConsentSchema, { id: consentId });
  if (consent.copyFileId) return;
  const file = work.em.create(StoredFileSchema, {
    siteId: consent.siteId,
    screeningId: consent.screeningId,
    participantId: consent.participantId ?? null,
    storageKey,
    kind: 'consent copy',
    contentType: 'application/pdf',
    byteCount: content.length,
    sha256: createHash('sha256').update(content).digest('hex'),
    createdAt: work.now,
  });
  await work.em.flush();
  consent.copyFileId = file.id;
  await work.em.flush();
}
