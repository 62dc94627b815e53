import { ConsentSchema } from '@/entities/consent';
import { StoredFileSchema } from '@/entities/stored-file';
import type { ServedFile } from '@/lib/web/serve-file';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

const extensionOf: Record<string, string> = { 'application/pdf': 'pdf', 'image/jpeg': 'jpg', 'image/png': 'png' };

/**
 * The signed paper form, or the participant's copy. Each handing out is written to the trail.
 * @throws Refusal 'not-found' out of reach, or while the copy is still being made.
 */
export async function fetchConsentFile(work: Work, { id, which }: { id: string; which: 'copy' | 'form' }): Promise<ServedFile> {
  const consent = await work.em.findOne(ConsentSchema, { id });
  const fileId = which === 'copy' ? consent?.copyFileId : work.actor.role === 'participant' ? null : consent?.paperFileId;
  const file = fileId ? await work.em.findOne(StoredFileSchema, { id: fileId }) : null;
  if (!consent || !file) throw new Refusal('not-found', which === 'copy' ? 'The copy is not there yet. It is made within a few minutes of the second signature.' : 'There is no signed form here.');
  await work.event('stored_file', file.id, { what: which }, { siteId: consent.siteId, ...(consent.participantId ? { participantId: consent.participantId } : {}) });
  return { storageKey: file.storageKey, contentType: file.contentType, byteCount: file.byteCount, filename: `consent-${which}.${extensionOf[file.contentType] ?? 'bin'}` };
}
