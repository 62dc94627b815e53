import { expect, type Page } from '@playwright/test';
import { demoAccounts } from '../../lib/people/demo-accounts.mjs';
import { ask, comeAlive, dayFromToday, open, sendTo, signIn, test } from './setup/pages';
import { codeOf, visitOf } from './setup/records';

/** What a reviewer will try. Each has a clear answer, and nothing typed is lost. */

const account = (key: string) => demoAccounts.find((one) => one.key === key) ?? { email: '', password: '' };
const screeningsOf = async (page: Page): Promise<number> => (await ask<{ counts: { screened: number } }>(page, '/api/screenings')).counts.screened;

/** Fills the form of a new screening; the answer is the name typed. */
async function fillScreening(page: Page, name: string): Promise<void> {
  await open(page, '/screening/new');
  await page.getByLabel('Name', { exact: true }).fill(name);
  await page.getByLabel(/^Referred by/).fill('Ward sister');
  await page.getByRole('group', { name: 'Cohort' }).getByRole('radio', { name: 'At risk of swelling' }).check();
}

const openIt = (page: Page) => page.getByRole('button', { name: 'Open the screening' });
const openedTitle = (page: Page) => page.getByRole('heading', { level: 1, name: /^Screening NM-S\d{4}/ });

async function openScreening(page: Page, name: string): Promise<string> {
  await fillScreening(page, name);
  await openIt(page).click();
  await expect(openedTitle(page)).toBeVisible();
  return new URL(page.url()).pathname;
}

test('another site’s record is not found, by page or by API, whatever the address', async ({ as }) => {
  const monitor = await as('monitor');
  const { rows } = await ask<{ rows: { participantCode: string; visitId: string | null; siteName: string; id: string }[] }>(monitor, '/api/queries?pageSize=100');
  const theirs = rows.find(({ siteName, visitId }) => siteName !== 'Northmoor' && visitId !== null);
  const ours = rows.find(({ siteName, visitId }) => siteName === 'Northmoor' && visitId !== null);
  if (!theirs || !ours) throw new Error('The demonstration has no queries at two sites.');
  const page = await as('coordinator');
  expect((await page.goto(`/participants/${ours.participantCode}/visits/${ours.visitId}`))?.status(), 'the own site’s opens').toBe(200);
  for (const path of [`/participants/${theirs.participantCode}`, `/participants/${theirs.participantCode}/visits/${theirs.visitId}`, `/participants/${ours.participantCode}/visits/${theirs.visitId}`]) {
    expect((await page.goto(path))?.status(), path).toBe(404);
    await expect(page.getByRole('heading', { level: 1, name: 'There is no such page' })).toBeVisible();
    await expect(page.getByRole('main')).not.toContainText(theirs.siteName);
  }
  for (const path of [`/api/participants/${theirs.participantCode}`, `/api/visits/${theirs.visitId}/assessment`]) expect((await page.request.get(path)).status(), path).toBe(404);
  expect((await sendTo(page, `/api/queries/${theirs.id}/answer`, { answer: 'Not mine to answer' }, { 'if-match': '"v1"' })).status()).toBe(404);
});

test('a participant who opens a staff page is led back to the own week', async ({ as }) => {
  const page = await as('participant-one');
  const code = await codeOf(page);
  for (const path of ['/today', '/participants', `/participants/${code}`, '/queries', '/results', '/extracts', '/screening']) {
    await page.goto(path);
    await expect(page, path).toHaveURL(/\/week$/);
  }
  const other = await codeOf(await as('participant-two'));
  expect((await page.request.get(`/api/participants/${other}`)).status()).toBe(403);
});

test('a monitor has no control that changes the record, and no address that does', async ({ as }) => {
  const coordinator = await as('coordinator');
  const code = await codeOf(await as('participant-one'));
  const visit = await visitOf(coordinator, code, 'Month 6');
  const toCome = await visitOf(coordinator, code, 'Month 12');
  const page = await as('monitor');
  await open(page, `/participants/${code}/visits/${visit.id}`);
  await page.getByRole('button', { name: /^Left arm at 20 cm, trial 1, / }).click();
  const chosen = page.getByRole('group', { name: 'The chosen value' });
  await expect(chosen.getByRole('button')).toHaveText(['Mark as seen', 'Write in the margin', 'History']);
  await page.keyboard.press('c');
  await expect(page.getByRole('dialog')).toHaveCount(0);
  const { trialIds, trials } = await ask<{ trialIds: { id: string; version: number }[]; trials: { circumferencesMm: number[] }[] }>(page, `/api/visits/${visit.id}/assessment`);
  const [trial] = trialIds;
  const refused = await sendTo(
    page,
    '/api/corrections',
    { target: { table: 'limb_trial', id: trial?.id, field: 'circumferences_mm.5' }, value: 251, reason: 'A monitor may not do this' },
    { 'if-match': `"v${trial?.version}"` },
  );
  expect(refused.status()).toBe(403);
  await page.goto(`/participants/${code}/visits/${toCome.id}`);
  for (const verb of ['Measure both arms', 'Book the visit', 'It did not take place']) await expect(page.getByText(verb)).toHaveCount(0);
  const again = await ask<{ trials: { circumferencesMm: number[] }[] }>(page, `/api/visits/${visit.id}/assessment`);
  expect(again.trials).toEqual(trials);
});

test('a submit pressed twice makes one', async ({ as }) => {
  const page = await as('coordinator');
  await fillScreening(page, 'Double Press');
  const before = await screeningsOf(page);
  await openIt(page).dblclick();
  await expect(openedTitle(page)).toBeVisible();
  expect(await screeningsOf(page)).toBe(before + 1);
  const key = { 'idempotency-key': crypto.randomUUID() };
  const body = { name: 'Same Key', cohort: 'at-risk', screenedOn: dayFromToday(0) };
  const [first, second] = await Promise.all([sendTo(page, '/api/screenings', body, key), sendTo(page, '/api/screenings', body, key)]);
  expect([first.ok(), second.ok()]).toEqual([true, true]);
  expect(((await first.json()) as { id: string }).id).toBe(((await second.json()) as { id: string }).id);
  expect(await screeningsOf(page)).toBe(before + 2);
});

test('without a line nothing typed is lost, and it is saved once the line is back', async ({ as }) => {
  const page = await as('coordinator');
  await fillScreening(page, 'Lost Line');
  const before = await screeningsOf(page);
  await page.context().setOffline(true);
  await openIt(page).click();
  await expect(page.getByRole('alert').filter({ hasText: 'Not saved, no connection.' })).toContainText('What you typed is still here; save again when the line is back.');
  await expect(page.getByLabel('Name', { exact: true })).toHaveValue('Lost Line');
  await expect(page.getByLabel(/^Referred by/)).toHaveValue('Ward sister');
  await page.context().setOffline(false);
  await openIt(page).click();
  await expect(openedTitle(page)).toBeVisible();
  expect(await screeningsOf(page)).toBe(before + 1);
});

test('two people save the same form: the second is told, and the words are still there', async ({ as }) => {
  const page = await as('coordinator');
  const path = await openScreening(page, 'Two Hands');
  const other = await as('site-investigator');
  for (const one of [page, other]) {
    await open(one, path);
    await one.getByRole('button', { name: 'Correct name or contact' }).click();
  }
  await other.getByLabel(/^Phone/).fill('01632 960901');
  await other.getByRole('button', { name: 'Save name and contact' }).click();
  await expect(other.getByText('01632 960901')).toBeVisible();
  await page.getByLabel(/^Phone/).fill('01632 960902');
  await page.getByRole('button', { name: 'Save name and contact' }).click();
  await expect(page.getByRole('alert').filter({ hasText: 'Somebody else saved this in the meantime.' })).toContainText('Your entry is still here');
  await expect(page.getByLabel(/^Phone/)).toHaveValue('01632 960902');
  await page.reload();
  await expect(page.getByText('01632 960901')).toBeVisible();
});

test('two people measure at once: the second is asked before anything is written over', async ({ as }) => {
  const assessor = await as('assessor');
  const coordinator = await as('coordinator');
  const code = await codeOf(await as('participant-one'));
  const visit = await visitOf(assessor, code, 'Month 9');
  for (const page of [assessor, coordinator]) {
    await open(page, `/participants/${code}/visits/${visit.id}/limb`);
    const begin = page.getByRole('button', { name: 'Begin measuring' });
    if (await begin.isVisible()) await begin.click();
    await expect(page.getByLabel('Remarks')).toBeVisible();
  }
  await assessor.getByLabel('Remarks').fill('Typed by the assessor');
  await assessor.getByLabel('Remarks').press('Tab');
  await expect(assessor.getByText(/^Kept on the server, \d/)).toBeVisible();
  await coordinator.getByLabel('Remarks').fill('Typed by the coordinator');
  await coordinator.getByLabel('Remarks').press('Tab');
  const conflict = coordinator.getByRole('alert').filter({ hasText: 'Somebody else saved this form in the meantime.' });
  await expect(conflict).toContainText('What you typed is still here.');
  await expect(coordinator.getByLabel('Remarks')).toHaveValue('Typed by the coordinator');
  await conflict.getByRole('button', { name: 'Go on from theirs' }).click();
  await expect(coordinator.getByLabel('Remarks')).toHaveValue('Typed by the assessor');

  await test.step('a weight in pounds is noticed; what is no number is answered in words', async () => {
    const weight = coordinator.getByLabel('Body weight, in kg');
    await weight.fill('165');
    await expect(coordinator.getByText('165 kg is unusual. If it was read in pounds, it is 74.8 kg.').first()).toBeVisible();
    await coordinator.getByRole('button', { name: 'Change to 74.8 kg' }).first().click();
    await expect(weight).toHaveValue('74.8');
    await expect(weight).toBeFocused();
    await expect(coordinator.getByText(/unusual/)).toHaveCount(0);
    const ratio = coordinator.getByLabel('Impedance ratio');
    await ratio.fill('10,5');
    await expect(coordinator.getByText('You typed 10.5; the ratio lies between 0.5 and 3. Was it 1.05?')).toBeVisible();
    await ratio.fill('');
    await weight.fill('seventy');
    await expect(coordinator.getByText('‘seventy’ is not a number. Type digits and one decimal point or comma, such as 23.6.').first()).toBeVisible();
    await weight.fill('74,8');
    await expect(coordinator.getByText(/unusual|is not a number/)).toHaveCount(0);
  });

  await test.step('a lost line is said, and what was typed goes when it is back', async () => {
    await coordinator.context().setOffline(true);
    await coordinator.getByLabel('Remarks').fill('Typed without a line');
    await coordinator.getByLabel('Remarks').press('Tab');
    await expect(coordinator.getByRole('alert').filter({ hasText: 'Not saved, no connection.' })).toBeVisible();
    await coordinator.context().setOffline(false);
    await coordinator.getByLabel('Remarks').press('Tab');
    await expect(coordinator.getByText(/^Kept on the server, \d/)).toBeVisible({ timeout: 45_000 });
    await open(coordinator, new URL(coordinator.url()).pathname);
    await expect(coordinator.getByLabel('Remarks')).toHaveValue('Typed without a line');
  });
});

interface Measured {
  readonly leftGirthsMm: readonly number[];
  readonly rightGirthsMm: readonly number[];
  readonly map: { readonly startOffsetMm: number; readonly stepMm: number };
}

/** A participant whose arms differ at the last visit by more than the 0.5 cm from which exchanged arms can be told. */
async function unequalArms(page: Page, except: readonly string[]): Promise<{ code: string; last: Measured }> {
  const { rows } = await ask<{ rows: { code: string; siteName: string; state: string; change: number | null }[] }>(page, '/api/participants?pageSize=100&sort=change&direction=desc&state=enrolled');
  for (const { code } of rows.filter(({ code: one, change }) => change !== null && !except.includes(one))) {
    const { visits } = await ask<{ visits: { id: string; state: string; doneOn: string | null; leftVolumeMl: number | null }[] }>(page, `/api/participants/${code}`);
    const done = visits.filter(({ state, leftVolumeMl }) => state === 'complete' && leftVolumeMl !== null).at(-1);
    if (!done || visits.some(({ state }) => state === 'in progress')) continue;
    const last = await ask<Measured>(page, `/api/visits/${done.id}/assessment`);
    const squares = last.leftGirthsMm.map((left, level) => (left - (last.rightGirthsMm[level] ?? left)) ** 2);
    if (Math.sqrt(squares.reduce((sum, one) => sum + one, 0) / squares.length) > 6) return { code, last };
  }
  throw new Error('The demonstration has nobody with unequal arms.');
}

test('left and right exchanged are asked about once both trials are in, without a figure from before', async ({ as }) => {
  const page = await as('coordinator');
  const { code, last } = await unequalArms(page, [await codeOf(await as('participant-one')), await codeOf(await as('participant-two'))]);
  await open(page, `/participants/${code}`);
  const added = await sendTo(page, '/api/visits', { code, on: dayFromToday(0), why: 'The arm feels fuller' }, { 'idempotency-key': crypto.randomUUID() });
  const { id } = (await added.json()) as { id: string };
  await open(page, `/participants/${code}/visits/${id}/limb`);
  await page.getByRole('button', { name: 'Begin measuring' }).click();
  const exchanged = [['Left', last.rightGirthsMm], ['Right', last.leftGirthsMm]] as const;
  for (const [side, girths] of exchanged)
    for (const [level, girthMm] of girths.entries())
      for (const trial of [1, 2]) await page.getByRole('textbox', { name: `${side} arm, ${(last.map.startOffsetMm + level * last.map.stepMm) / 10} cm, trial ${trial}, in cm` }).fill((Math.round(girthMm) / 10).toFixed(1));
  await expect(page.getByText(/may be swapped/)).toHaveCount(0);
  await page.getByLabel('Position of the arms').selectOption({ index: 1 });
  await page.getByRole('radio', { name: 'Not worn' }).check();
  await page.getByRole('button', { name: 'Save and see the result' }).click();
  const asked = page.getByRole('listitem').filter({ hasText: 'Left and right may be swapped' });
  await expect(asked.getByRole('button', { name: 'Keep it, give a reason' })).toBeVisible();
  await expect(asked).not.toContainText(/\d/);
  await expect(page.getByRole('heading', { name: 'Result' })).toHaveCount(0);
});

test('a day to come is refused, and the form stays as typed', async ({ as }) => {
  const page = await as('coordinator');
  await fillScreening(page, 'Day Ahead');
  const before = await screeningsOf(page);
  await page.getByLabel('Screened on').fill(dayFromToday(2));
  await openIt(page).click();
  await expect(page.getByText(/\d{1,2} [A-Z][a-z]{2} \d{4} is still to come\. Give the day of screening\./).first()).toBeVisible();
  await expect(page.getByLabel('Name', { exact: true })).toHaveValue('Day Ahead');
  expect(await screeningsOf(page)).toBe(before);
  const participant = await as('participant-two');
  await participant.goto('/week');
  const ahead = await sendTo(
    participant,
    '/api/training',
    {
      clientKey: crypto.randomUUID(), on: dayFromToday(2), armCheck: 'the same', soreness: 'no', effort: 3, note: null,
      sets: [{ exercise: 'biceps-curl', equipment: 'dumbbell', basis: 'per hand', side: 'both', typed: 1, unit: 'kg', repetitions: 10, setCount: 2, effort: 3, alreadyLifted: false }],
    },
    { 'idempotency-key': crypto.randomUUID() },
  );
  expect(ahead.status()).toBe(422);
  expect(await ahead.text()).toContain('has not come yet');
});

test('an upload that is not what it says is refused by its content', async ({ as }) => {
  const page = await as('coordinator');
  const path = await openScreening(page, 'Paper Form');
  await open(page, path);
  await page.getByRole('button', { name: 'Use the paper form' }).click();
  const field = page.getByLabel(/^The signed form/);
  const add = page.getByRole('button', { name: /^(Add|Replace) the signed form$/ });
  const tries = [
    { file: { name: 'signed.pdf', mimeType: 'application/pdf', buffer: Buffer.from('<!doctype html><script>alert(1)</script>') }, answer: 'This is a web page. Send a PDF, or a photograph of the form as JPEG or PNG.' },
    { file: { name: 'signed.png', mimeType: 'image/png', buffer: Buffer.from('#!/bin/sh\necho signed\n') }, answer: 'This is a script. Send a PDF, or a photograph of the form as JPEG or PNG.' },
    { file: { name: 'signed.pdf', mimeType: 'application/pdf', buffer: Buffer.from('%PDF-1.7\ncut off') }, answer: 'This begins like a PDF but is not a whole one.' },
  ];
  for (const { file, answer } of tries) {
    await field.setInputFiles(file);
    await add.click();
    await expect(page.getByText(answer)).toBeVisible();
    await expect(page.getByRole('heading', { name: 'What stands on the form' })).toHaveCount(0);
  }
  // One white pixel: a whole PNG.
  const pixel = Buffer.from('iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mP8z8BQDwAEhQGAhKmMIQAAAABJRU5ErkJggg==', 'base64');
  await field.setInputFiles({ name: 'signed.png', mimeType: 'image/png', buffer: pixel });
  await add.click();
  await expect(page.getByRole('heading', { name: 'What stands on the form' })).toBeVisible();
});

test('signed out in the middle of a form: the words stay, and go once signed in again', async ({ page }) => {
  await signIn(page, account('coordinator'));
  await fillScreening(page, 'Signed Out');
  const before = await screeningsOf(page);
  const elsewhere = await page.context().newPage();
  await open(elsewhere, '/queries');
  await elsewhere.getByRole('button', { name: 'Sign out' }).click();
  await expect(elsewhere).toHaveURL(/\/sign-in$/);
  await openIt(page).click();
  await expect(page.getByRole('alert').filter({ hasText: 'You are signed out.' })).toContainText('What you typed is still here');
  await expect(page.getByLabel('Name', { exact: true })).toHaveValue('Signed Out');
  await signIn(elsewhere, account('coordinator'));
  await openIt(page).click();
  await expect(openedTitle(page)).toBeVisible();
  expect(await screeningsOf(page)).toBe(before + 1);
});

test('a session that was left open is worth nothing once it ended', async ({ page, browser }) => {
  await signIn(page, account('coordinator'));
  const kept = await page.context().storageState();
  await comeAlive(page);
  await page.getByRole('button', { name: 'Sign out' }).click();
  await expect(page).toHaveURL(/\/sign-in$/);
  const context = await browser.newContext({ storageState: kept });
  const thief = await context.newPage();
  await thief.goto('/today');
  await expect(thief).toHaveURL(/\/sign-in$/);
  expect((await thief.request.get('/api/today')).status()).toBe(401);
  await context.close();
});

test('a guessed invitation link opens nothing', async ({ browser }) => {
  const context = await browser.newContext();
  const page = await context.newPage();
  for (const guess of ['1', 'invitation', 'A'.repeat(43), crypto.randomUUID()]) {
    for (const room of ['join', 'consent']) {
      await page.goto(`/${room}/${guess}`);
      await expect(page.getByRole('heading', { level: 1, name: 'This link does not open' }), `${room}/${guess}`).toBeVisible();
    }
  }
  await page.goto('/today');
  await expect(page).toHaveURL(/\/sign-in$/);
  await context.close();
});
