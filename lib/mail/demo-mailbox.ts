import { z } from 'zod';
import { env } from '@/lib/env';

const capturedLetter = z.object({
  id: z.string(),
  at: z.iso.datetime(),
  from: z.string(),
  to: z.array(z.string()),
  subject: z.string(),
});

const capturedLetterWhole = capturedLetter.extend({
  text: z.string(),
  html: z.string(),
  attachments: z.array(z.object({ filename: z.string(), contentType: z.string(), sizeBytes: z.int() })),
});

/** A letter that the demonstration's mail capture holds instead of sending it out. */
export type CapturedLetter = z.infer<typeof capturedLetter>;
export type CapturedLetterWhole = z.infer<typeof capturedLetterWhole>;

/** True in the demonstration only; the page must answer 'not found' otherwise. */
export function hasDemoMailbox(): boolean {
  return env().DEMO && env().DEMO_MAILBOX_URL !== null;
}

async function ask(path: string): Promise<Response> {
  const { DEMO, DEMO_MAILBOX_URL } = env();
  if (!DEMO || !DEMO_MAILBOX_URL) throw new Error('There is no mailbox outside the demonstration.');
  return fetch(new URL(path, DEMO_MAILBOX_URL), { cache: 'no-store', signal: AbortSignal.timeout(5000) });
}

/** The captured letters, newest first; those to one address when `to` is given. */
export async function listCapturedLetters(to?: string): Promise<CapturedLetter[]> {
  const answer = await ask(to ? `/letters?to=${encodeURIComponent(to)}` : '/letters');
  if (!answer.ok) throw new Error(`The mail capture answered ${answer.status}.`);
  return z.array(capturedLetter).parse(await answer.json());
}

/** One captured letter, or null when there is none of that id. */
export async function readCapturedLetter(id: string): Promise<CapturedLetterWhole | null> {
  const answer = await ask(`/letters/${encodeURIComponent(id)}`);
  if (answer.status === 404) return null;
  if (!answer.ok) throw new Error(`The mail capture answered ${answer.status}.`);
  return capturedLetterWhole.parse(await answer.json());
}
