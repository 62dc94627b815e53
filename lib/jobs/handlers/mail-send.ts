import { buffer } from 'node:stream/consumers';
import { z } from 'zod';
import { letterNamed } from '@/lib/mail';
import { defineJob } from '../define-job';

/** Sends one letter. Attachments are named by their key in the file store and read when the letter goes out. */
export const mailSend = defineJob({
  name: 'mail.send',
  payload: z.strictObject({
    letter: z.string(),
    to: z.email(),
    data: z.record(z.string(), z.unknown()),
    attachments: z.array(z.strictObject({ filename: z.string().max(120), contentType: z.string(), key: z.string() })).max(3).optional(),
  }),
  // Eight attempts over about four hours: longer than most failures of a mail server.
  retry: { limit: 7, delaySeconds: 60, backoff: true },
  async run({ letter, to, data, attachments = [] }, { sendLetter, storage, jobId }) {
    const files = await Promise.all(
      attachments.map(async ({ filename, contentType, key }) => ({ filename, contentType, content: await buffer(await storage.get(key)) })),
    );
    await sendLetter(letterNamed(letter), { to, data, attachments: files, id: jobId });
  },
});
