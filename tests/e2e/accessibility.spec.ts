import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';
import { ask, test } from './setup/pages';
import { codeOf, visitOf } from './setup/records';
import type { signedIn } from './setup/signed-in';

const rules = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];
const desktop = { width: 1440, height: 900 };
const phone = { width: 390, height: 844 };
const narrowest = { width: 320, height: 720 };

type Key = Parameters<typeof signedIn>[0];

/** Every page that the masthead offers this person. */
async function offered(page: Page): Promise<string[]> {
  await page.goto('/');
  return page.getByRole('navigation').first().getByRole('link').evaluateAll((links) => links.map((link) => new URL((link as HTMLAnchorElement).href).pathname));
}

async function overflow(page: Page): Promise<number> {
  return page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
}

/** A page answers, has one heading of the first level, no finding of axe at its own size, and fits a phone. */
async function check(page: Page, path: string, size: typeof desktop): Promise<void> {
  await test.step(path, async () => {
    await page.setViewportSize(size);
    const answer = await page.goto(path);
    expect.soft(answer?.status(), `${path} does not open`).toBe(200);
    if (answer?.status() !== 200) return;
    await expect.soft(page.getByRole('heading', { level: 1 }), `${path} has no single heading`).toHaveCount(1);
    const { violations } = await new AxeBuilder({ page }).withTags(rules).analyze();
    expect.soft(violations.map(({ id, nodes }) => `${path}, ${id}: ${nodes.slice(0, 4).map(({ target }) => target.join(' ')).join(', ')}`)).toEqual([]);
    for (const small of [phone, narrowest]) {
      await page.setViewportSize(small);
      await expect.soft.poll(() => overflow(page), { message: `${path} scrolls sideways at ${small.width} px`, timeout: 4_000 }).toBeLessThanOrEqual(0);
    }
  });
}

test.describe('WCAG 2.2 AA as far as a program can see, and no sideways scroll at 390 and 320 px', () => {
  test.describe.configure({ timeout: 400_000 });

  test('pages before sign-in', async ({ page }) => {
    for (const path of ['/sign-in', '/join/guessed', '/consent/guessed']) await check(page, path, desktop);
  });

  test('a participant’s pages at 390 px', async ({ as }) => {
    const page = await as('participant-one');
    const { open } = await ask<{ open: { id: string }[] }>(page, '/api/questionnaires');
    const [questionnaire] = open;
    if (!questionnaire) throw new Error('No questionnaire is open.');
    for (const path of ['/week', '/my-arm', '/my-lifting', '/questions', '/my-consent', '/log', '/report', `/questions/${questionnaire.id}`]) await check(page, path, phone);
  });

  test('the site’s pages', async ({ as }) => {
    const page = await as('coordinator');
    const code = await codeOf(await as('participant-one'));
    const [done, toCome, underWay] = [await visitOf(page, code, 'Month 6'), await visitOf(page, code, 'Month 12'), await visitOf(page, code, 'Month 9')];
    const { rows } = await ask<{ rows: { id: string }[] }>(page, '/api/screenings?state=screening');
    const { urgent } = await ask<{ urgent: { id: string }[] }>(page, '/api/today');
    const visits = `/participants/${code}/visits`;
    for (const path of [
      ...(await offered(page)),
      '/screening', '/screening/new', `/screening/${rows[0]?.id}`, `/safety/${urgent[0]?.id}`,
      `/participants/${code}`, `${visits}/${done.id}`, `${visits}/${done.id}/limb`, `${visits}/${toCome.id}`, `${visits}/${underWay.id}/limb`,
    ])
      await check(page, path, desktop);
  });

  // What the site's pages already covered is only opened; the pages that are a role's own are looked at.
  for (const [key, own] of [
    ['assessor', []],
    ['site-investigator', []],
    ['monitor', ['/queries', '/participants']],
    ['investigator', ['/results', '/extracts', '/extracts/new']],
    ['data-manager', ['/people']],
    ['administrator', ['/people', '/protocol']],
    ['auditor', ['/audit', '/extracts']],
  ] as const satisfies readonly (readonly [Key, readonly string[]])[]) {
    test(`every page the masthead offers opens: ${key}`, async ({ as }) => {
      const page = await as(key);
      const paths = await offered(page);
      expect(paths.length).toBeGreaterThan(0);
      for (const path of paths) expect.soft((await page.request.get(path)).status(), path).toBe(200);
      for (const path of own) await check(page, path, desktop);
    });
  }
});
