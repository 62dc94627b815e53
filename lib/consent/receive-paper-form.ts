import { createHash, randomUUID } from 'node:crypto';
import { ConsentSchema } from '@/entities/consent';
import { StoredFileSchema } from '@/entities/stored-file';
import type { Actor } from '@/lib/auth/roles';
import { storage } from '@/lib/storage';
import { Refusal } from '@/lib/work/refusal';
import { withWork } from '@/lib/work/with-work';
import type { Work, WorkOptions } from '@/lib/work/work';
import { recogniseForm } from './recognise-form';

/** A form that was received. */
export interface PaperFormView {
  readonly id: string;
  readonly contentType: string;
  readonly byteCount: number;
  readonly version: number;
}

async function findPaperConsent(work: Work, id: string) {
  const consent = await work.em.findOne(ConsentSchema, { id });
  if (!consent) throw new Refusal('not-found', 'There is no such consent.');
  if (consent.mode !== 'paper' || consent.state !== 'reading') throw new Refusal('conflict', 'A form can be added only to a consent on paper that is not yet recorded as signed.');
  return consent;
}

/**
 * Takes in the signed paper form: judged by its content, kept in the file store, then joined to the consent.
 * No file is touched inside a transaction; one that was stored and could not be joined is removed again.
 * @throws Refusal 'invalid' when it is no whole PDF, JPEG or PNG.
 */
export async function receivePaperForm(actor: Actor, { id }: { id: string }, content: Buffer, options: WorkOptions = {}): Promise<PaperFormView> {
  await withWork(actor, 'consent.upload', (work) => findPaperConsent(work, id), options);
  const { contentType, extension } = await recogniseForm(content);
  const key = `consent/${id}/${randomUUID()}.${extension}`;
  await storage().put(key, content, { contentType });
  try {
    return await withWork(actor, 'consent.upload', (work) => joinForm(work, { id, key, contentType, content }), options);
  } catch (error) {
    await storage().remove(key);
    throw error;
  }
}

async function joinForm(work: Work, { id, key, contentType, content }: { id: string; key: string; contentType: string; content: Buffer }): Promise<PaperFormView> {
  const consent = await findPaperConsent(work, id);
  const file = work.em.create(StoredFileSchema, {
    siteId: consent.siteId,
    screeningId: consent.screeningId,
    participantId: null,
    storageKey: key,
    kind: 'signed consent',
    contentType,
    byteCount: content.length,
    sha256: createHash('sha256').update(content).digest('hex'),
    createdAt: work.now,
  });
  await work.em.flush();
  consent.paperFileId = file.id;
  await work.em.flush();
  return { id: consent.id, contentType, byteCount: content.length, version: consent.version };
}
