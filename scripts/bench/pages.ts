import { readdirSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { chromium, type Browser, type Request } from '@playwright/test';
import { demoAccounts } from '../demo-accounts.mjs';
import type { Bench, PageFigure } from './figures';
import { addressOf, benchPages, leftOut } from './page-table';
import { SignedIn } from './signed-in';
import { connect } from './statements';

const appFolder = fileURLToPath(new URL('../../app', import.meta.url));
// The sandbox cannot start as root; the rest keeps the browser from calling its maker's hosts.
const args = ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync'];

/** Addresses of the pages in app, without groups. */
function routesInApp(): string[] {
  return readdirSync(appFolder, { recursive: true, encoding: 'utf8' })
    .filter((file) => /(^|\/)page\.tsx$/.test(file))
    .map((file) => `/${file.split('/').slice(0, -1).filter((part) => !part.startsWith('(')).join('/')}`)
    .sort();
}

/**
 * Opens a page in a context of its own, with nothing cached, and adds up the scripts it loads until it is still. What
 * Next fetches ahead for the pages behind its links is held back, because it is not this page's own weight.
 */
async function weigh(browser: Browser, { url, path, cookies }: { url: string; path: string; cookies: SignedIn['cookies'] }): Promise<Omit<PageFigure, 'kind' | 'role'> & { landedOn: string }> {
  const context = await browser.newContext({ locale: 'en-GB', viewport: { width: 1440, height: 900 } });
  await context.addCookies(cookies);
  const page = await context.newPage();
  await page.route('**/*', (route) => (route.request().headers()['next-router-prefetch'] ? route.abort() : route.continue()));
  const scripts: Request[] = [];
  page.on('requestfinished', (request) => void (request.resourceType() === 'script' && scripts.push(request)));
  const response = await page.goto(new URL(path, url).href, { waitUntil: 'networkidle' });
  let transferBytes = 0;
  let rawBytes = 0;
  for (const request of scripts) {
    transferBytes += (await request.sizes()).responseBodySize;
    rawBytes += (await (await request.response())?.body())?.length ?? 0;
  }
  const landedOn = new URL(page.url()).pathname;
  await context.close();
  return { path, landedOn, status: response?.status() ?? 0, files: scripts.length, transferBytes, rawBytes };
}

/** The scripts of every page, as transferred, signed in as somebody who opens it. */
export async function benchPageScripts({ participants, url, tell }: Bench): Promise<void> {
  const inApp = routesInApp();
  const notRun = (what: string, why: string): void => tell({ kind: 'not run', part: 'pages', participants, what, why });
  for (const route of inApp) if (!leftOut.includes(route) && !benchPages.some((page) => page.route === route)) notRun(route, 'it is missing in scripts/bench/page-table.ts');
  const owner = await connect('OWNER_DATABASE_URL');
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args });
  const signedIn = new Map<string, SignedIn>();
  for (const benchPage of benchPages) {
    const { route, account } = benchPage;
    if (!inApp.includes(route)) {
      notRun(route, 'the application has no such page');
      continue;
    }
    const demo = demoAccounts.find(({ key }) => key === account);
    if (account && !signedIn.has(account)) signedIn.set(account, await SignedIn.as(account, url));
    const path = await addressOf(benchPage, demo?.email ?? null, owner);
    if (path === null) {
      notRun(route, 'the seeded data holds nothing to show there');
      continue;
    }
    const { landedOn, ...weight } = await weigh(browser, { url, path, cookies: signedIn.get(account ?? '')?.cookies ?? [] });
    if (landedOn === path && weight.status === 200) tell({ kind: 'page', role: demo?.roleLabel ?? 'nobody', ...weight, path: route });
    else notRun(route, `${account ?? 'nobody'} was answered ${weight.status} at ${landedOn}`);
  }
  await browser.close();
  await owner.end();
}
