import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { expect } from '@playwright/test';
import { demoAccounts } from '../../lib/people/demo-accounts.mjs';
import { ask, open, sendTo, test } from './setup/pages';

const sha256 = (content: Buffer): string => createHash('sha256').update(content).digest('hex');

test('an investigator reads swelling by two definitions and changes one in the sentence', async ({ as }) => {
  test.setTimeout(120_000);
  const page = await as('investigator');
  await open(page, '/results');
  const definition = page.getByRole('combobox', { name: 'definition B' });
  const before = await definition.inputValue();
  const other = await page.getByRole('combobox', { name: 'definition A' }).inputValue();
  const choices = await definition.locator('option').evaluateAll((options) => options.map((option) => ({ value: (option as HTMLOptionElement).value, name: option.textContent ?? '' })));
  const next = choices.find(({ value }) => value !== before && value !== other);
  if (!next) throw new Error('There is no third definition to choose.');
  const table = page.getByRole('table', { name: 'Share with swelling by month' });
  const shareByB = async () => (await table.getByRole('row').filter({ hasText: '12 months' }).getByRole('cell').allTextContents()).slice(3, 5);
  await expect(table.getByRole('row').filter({ hasText: '12 months' })).toBeVisible();
  const sharesBefore = await shareByB();
  await definition.selectOption(next.value);
  await expect(page).toHaveURL(new RegExp(`second=${next.value}`));
  await expect(page.getByText(new RegExp(`^B, ${next.name.replace(/[.*+?^${}()|[\]\\]/g, '\\$&')}: `))).toBeVisible();
  expect(await shareByB()).not.toEqual(sharesBefore);
  await expect(page.getByText('It cannot say that lifting causes or prevents swelling.')).toBeVisible();
  await page.reload();
  await expect(page.getByRole('combobox', { name: 'definition B' })).toHaveValue(next.value);
});

interface Identity {
  readonly name: string;
  readonly email: string | null;
  readonly phone: string | null;
  readonly bornOn: string | null;
}

test('a de-identified data set is asked for, prepared, saved and holds nobody', async ({ as }) => {
  test.setTimeout(240_000);
  const coordinator = await as('coordinator');
  await coordinator.goto('/today');
  const { rows } = await ask<{ rows: { code: string }[] }>(coordinator, '/api/participants?page=0&pageSize=25');
  const identities: Identity[] = [];
  for (const { code } of rows.slice(0, 12)) identities.push((await (await sendTo(coordinator, `/api/participants/${code}/identity`, {})).json()) as Identity);
  expect(identities.filter(({ name }) => name.length > 3)).toHaveLength(12);

  const page = await as('investigator');
  await open(page, '/extracts');
  await page.getByRole('link', { name: 'Ask for an extract' }).click();
  const button = page.getByRole('button', { name: 'Ask for the open extract' });
  await button.click();
  await expect(page.getByText('Write the question the data are for.').first()).toBeVisible();
  await page.getByLabel('Purpose').fill('How loads progress before swelling is first seen');
  await page.getByLabel('Recipient').fill('Statistics group');
  await button.click();
  await expect(page.getByRole('heading', { level: 1, name: /^Extract \d+$/ })).toBeVisible();
  const files = page.getByRole('table', { name: 'Files of this extract' });
  await expect(files).toBeVisible({ timeout: 90_000 });

  const saved = new Map<string, { content: Buffer; shown: string }>();
  for (const line of await files.getByRole('row').filter({ hasText: /\.(csv|txt)/ }).all()) {
    const shown = /[0-9a-f]{64}/.exec((await line.textContent()) ?? '')?.[0] ?? '';
    const download = page.waitForEvent('download');
    await line.getByRole('link', { name: /^Save/ }).click();
    const arrived = await download;
    saved.set(arrived.suggestedFilename().replace(/^extract-\d+-/, ''), { content: await readFile(await arrived.path()), shown });
  }
  const checksums = saved.get('checksums.txt');
  if (!checksums) throw new Error('There is no checksums.txt.');
  const data = [...saved].filter(([name]) => name.endsWith('.csv'));
  expect(data.length).toBeGreaterThan(3);
  expect(data.map(([name]) => name)).toContain('codebook.csv');

  for (const [name, { content, shown }] of saved) {
    expect(sha256(content), `${name} is not the file whose checksum the page shows`).toBe(shown);
    if (name !== 'checksums.txt') expect(checksums.content.toString()).toContain(`${shown}  ${name}\n`);
  }

  const names = [...demoAccounts.map(({ name, email }) => ({ name, email })), ...identities];
  const words = [
    ...names.map(({ name }) => name),
    ...names.flatMap(({ email }) => (email ? [email] : [])),
    ...identities.flatMap(({ phone, bornOn }) => [phone, bornOn].filter((word) => word !== null)),
    ...rows.map(({ code }) => code),
    ...['Northmoor', 'Saltmarsh', 'Kestrel Bay'],
  ];
  for (const [name, { content }] of data) {
    const text = content.toString();
    expect(text.split('\n').length, `${name} holds rows`).toBeGreaterThan(2);
    expect(words.filter((word) => text.includes(word)), `${name} names somebody`).toEqual([]);
    expect(/@|\.example/.exec(text)?.[0], `${name} holds an address`).toBeUndefined();
    expect(/\b(19|20)\d\d-\d\d-\d\d|\b\d{1,2}[/.]\d{1,2}[/.](19|20)?\d\d\b/.exec(text)?.[0], `${name} holds a date`).toBeUndefined();
  }

  await test.step('a monitor reaches neither the ledger nor the files', async () => {
    const monitor = await as('monitor');
    const id = new URL(page.url()).pathname.split('/').at(-1);
    expect((await monitor.request.get(`/api/extracts/${id}/files/checksums.txt`)).status()).toBe(403);
    const answer = await monitor.goto(`/extracts/${id}`);
    expect(answer?.status()).toBe(403);
  });
});
