import { expect } from '@playwright/test';

export interface Letter {
  id: string;
  subject: string;
  text: string;
  attachments: { filename: string; contentType: string; sizeBytes: number }[];
}

async function ask(path: string): Promise<unknown> {
  const address = process.env['E2E_MAIL_URL'];
  if (!address) throw new Error('E2E_MAIL_URL is not set: run the browser tests through npm test, or see scripts/e2e-servers.mjs.');
  return (await fetch(new URL(path, address))).json();
}

/** Waits for the newest captured letter to an address whose subject matches. */
export async function letterTo(email: string, subject: RegExp): Promise<Letter> {
  let found: { id: string; subject: string } | undefined;
  await expect(async () => {
    const letters = (await ask(`/letters?to=${encodeURIComponent(email)}`)) as { id: string; subject: string }[];
    found = letters.find((letter) => subject.test(letter.subject));
    expect(found, `no letter to ${email} yet`).toBeTruthy();
  }).toPass({ timeout: 30_000 });
  return (await ask(`/letters/${found?.id}`)) as Letter;
}

/** The first address in a letter's text. */
export function linkIn(letter: Letter): string {
  const link = /https?:\/\/\S+/.exec(letter.text)?.[0];
  if (!link) throw new Error(`The letter '${letter.subject}' holds no link.`);
  return link;
}
