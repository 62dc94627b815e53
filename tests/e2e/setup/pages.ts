import { test as base, type APIResponse, type Browser, type Page } from '@playwright/test';
import { signedIn } from './signed-in';

type Key = Parameters<typeof signedIn>[0];

/** `as('monitor')` gives a page in which that demonstration account is signed in, apart from every other. */
export const test = base.extend<{ as: (key: Key) => Promise<Page> }>({
  as: async ({ browser }, provide) => {
    const contexts: Awaited<ReturnType<Browser['newContext']>>[] = [];
    await provide(async (key) => {
      const context = await browser.newContext({ storageState: signedIn(key) });
      contexts.push(context);
      return context.newPage();
    });
    for (const context of contexts) await context.close();
  },
});

/** Waits until what stands on the page answers to a press: the server's HTML is there before React is. */
export async function comeAlive(page: Page): Promise<void> {
  await page.waitForFunction(() => {
    const controls = [...document.querySelectorAll('main button, main input, main select, main textarea')];
    return controls.every((control) => Object.keys(control).some((key) => key.startsWith('__reactProps')));
  });
}

/** Opens an address of ours and waits until it answers to a press. */
export async function open(page: Page, path: string): Promise<void> {
  await page.goto(path);
  await comeAlive(page);
}

/** Signs in through the sign-in page, with a session of its own that nobody else uses. */
export async function signIn(page: Page, { email, password }: { email: string; password: string }): Promise<void> {
  await open(page, '/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL((url) => url.pathname !== '/sign-in');
}

/** Asks the API in the page's own session; `read` is what it answered. */
export async function ask<Answer>(page: Page, path: string): Promise<Answer> {
  const answer = await page.request.get(path);
  if (!answer.ok()) throw new Error(`${path} answered ${answer.status()}: ${await answer.text()}`);
  return (await answer.json()) as Answer;
}

/** Sends to the API as a script on our own page would. */
export const sendTo = (page: Page, path: string, data: object, headers: Record<string, string> = {}): Promise<APIResponse> =>
  page.request.post(path, { data, headers: { origin: new URL(page.url()).origin, ...headers } });

/** A day so many days from today, as a date field takes it. By the clock of London, as the first site's. */
export function dayFromToday(days: number): string {
  const at = new Date(Date.now() + days * 86_400_000);
  return new Intl.DateTimeFormat('en-CA', { timeZone: 'Europe/London' }).format(at);
}
