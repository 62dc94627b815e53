import { buffer } from 'node:stream/consumers';
import { z } from 'zod';
import { systemActor } from '@/lib/auth/roles';
import { printConsent } from '@/lib/consent/consent-pdf';
import { joinCopy, readCopy } from '@/lib/consent/keep-copy';
import { consentCopy as letter } from '@/lib/mail/letters/consent-copy';
import { firstName } from '@/lib/people/first-name';
import { withWork } from '@/lib/work/with-work';
import { defineJob } from '../define-job';

/** Makes the participant's copy of a complete consent, keeps it, and mails it unless no letter is wanted. A copy that is kept is not made again. */
export const consentCopy = defineJob({
  name: 'consent.copy',
  payload: z.strictObject({ siteId: z.uuid(), consentId: z.uuid(), letter: z.literal('none').optional() }),
  retry: { limit: 7, delaySeconds: 60, backoff: true },
  async run({ siteId, consentId, letter: wanted }, { sendLetter, storage, jobId, now }) {
    const system = systemActor([siteId]);
    const copy = await withWork(system, 'job.mail', (work) => readCopy(work, consentId), { now: now() });
    if (!copy) return;
    const content = copy.kept ? await buffer(await storage.get(copy.kept.storageKey)) : await printConsent(copy.print);
    const contentType = copy.kept?.contentType ?? 'application/pdf';
    if (!copy.kept) {
      const storageKey = `consent/${consentId}/copy-${jobId}.pdf`;
      await storage.put(storageKey, content, { contentType });
      await withWork(system, 'job.mail', (work) => joinCopy(work, { consentId, storageKey, content }), { now: now() });
    }
    if (!copy.to || wanted === 'none') return;
    const extension = { 'application/pdf': 'pdf', 'image/jpeg': 'jpg', 'image/png': 'png' }[contentType] ?? 'bin';
    await sendLetter(letter, {
      to: copy.to,
      data: { greetingName: firstName(copy.name), siteName: copy.siteName },
      attachments: [{ filename: `your-copy.${extension}`, contentType, content }],
      id: jobId,
    });
  },
});
