import AxeBuilder from '@axe-core/playwright';
import { expect, test } from '@playwright/test';

const rules = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];
const pages = ['/gallery', '/gallery/staff', '/gallery/phone'] as const;
const sizes = [
  { name: '1440 px', width: 1440, height: 900 },
  { name: '390 px', width: 390, height: 844 },
] as const;

for (const path of pages) {
  for (const size of sizes) {
    for (const colorScheme of ['light', 'dark'] as const) {
      test(`${path} at ${size.name}, ${colorScheme}, meets WCAG 2.2 AA as far as a program can see`, async ({ browser, baseURL }) => {
        test.setTimeout(180_000);
        const context = await browser.newContext({
          viewport: { width: size.width, height: size.height },
          colorScheme,
          ...(baseURL ? { baseURL } : {}),
          reducedMotion: 'reduce',
        });
        const page = await context.newPage();
        await page.goto(path);
        await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
        const { violations } = await new AxeBuilder({ page }).withTags(rules).analyze();
        expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`)).toEqual([]);
        const overflow = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
        expect(overflow, 'the page scrolls sideways').toBeLessThanOrEqual(0);
        await context.close();
      });
    }
  }
}

test('an open dialog keeps focus inside, names itself, and gives focus back on Escape', async ({ page }) => {
  test.setTimeout(90_000);
  await page.goto('/gallery');
  const opener = page.getByRole('button', { name: 'Ask for a reason' });
  const dialog = page.getByRole('dialog', { name: 'Why does 27.4 become 25.9?' });
  // A press before the page has come alive does nothing, so it is repeated until the dialog answers.
  await expect(async () => {
    await opener.click({ timeout: 2_000 });
    await expect(dialog).toBeVisible({ timeout: 2_000 });
  }).toPass({ timeout: 30_000 });
  await dialog.getByRole('button', { name: 'Change and sign' }).click();
  await expect(dialog.getByText('Give your password; it is your signature.')).toBeVisible();
  const { violations } = await new AxeBuilder({ page }).include('dialog[open]').withTags(rules).analyze();
  expect(violations.map(({ id }) => id)).toEqual([]);
  await page.keyboard.press('Escape');
  await expect(dialog).toBeHidden();
  await expect(opener).toBeFocused();
});

test('the table sorts by keyboard and says so', async ({ page }) => {
  test.setTimeout(90_000);
  await page.goto('/gallery');
  const table = page.getByRole('table', { name: 'Queries', exact: true });
  const head = table.getByRole('columnheader', { name: 'Participant' });
  await expect(head).toHaveAttribute('aria-sort', 'none');
  await expect(async () => {
    await head.getByRole('button').focus();
    await page.keyboard.press('Enter');
    await expect(head).toHaveAttribute('aria-sort', 'ascending', { timeout: 2_000 });
  }).toPass({ timeout: 30_000 });
  await expect(table.getByRole('row').nth(1)).toContainText('KB-0018');
});

test('a stepper steps by button, by arrow key and by typing', async ({ page }) => {
  test.setTimeout(90_000);
  await page.goto('/gallery');
  const figure = page.getByRole('textbox', { name: /^Load/ });
  const section = page.locator('#phone-controls');
  await expect(async () => {
    if ((await figure.inputValue()) === '7.0') await section.getByRole('button', { name: 'More' }).first().click({ timeout: 2_000 });
    await expect(figure).toHaveValue('7.5', { timeout: 2_000 });
  }).toPass({ timeout: 30_000 });
  await figure.press('ArrowDown');
  await expect(figure).toHaveValue('7.0');
  await figure.fill('8,5');
  await figure.press('Tab');
  await expect(figure).toHaveValue('8.5');
});
