import { expect } from '@playwright/test';
import { codeOf } from './setup/records';
import { ask, open, test } from './setup/pages';
import { signedIn } from './setup/signed-in';

test.use({ storageState: signedIn('participant-one') });
test.describe.configure({ mode: 'serial' });

interface LogView {
  readonly today: string;
  readonly last: Readonly<Record<string, { readonly typed: number; readonly unit: string }>>;
}

interface Lifting {
  readonly sessionCount: number;
  readonly sessions: readonly { readonly on: string; readonly sets: readonly { readonly name: string; readonly typed: number; readonly unit: string; readonly alreadyLifted: boolean }[] }[];
}

test('a session is logged: arm check first, advice on a jump, pounds noticed, the line lost and found', async ({ page, context }) => {
  test.setTimeout(180_000);
  const { last, today } = await ask<LogView>(page, '/api/training');
  const before = await ask<Lifting>(page, '/api/lifting');
  const chest = last['chest-press'];
  const row = last['seated-row'];
  if (!chest || !row) throw new Error('The demonstration has no earlier session of this participant.');
  const jumpKg = chest.typed + 6;
  const asPounds = Math.round((row.typed / 0.45359237) * 2) / 2;

  await test.step('the arm check comes before any load', async () => {
    await open(page, '/week');
    await page.getByRole('link', { name: 'Log a session' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Since your last session, your left arm is' })).toBeVisible();
    await page.getByRole('button', { name: 'Go on', exact: true }).click();
    await expect(page.getByText('Answer this first: which comes nearest?')).toBeVisible();
    await expect(page.getByRole('heading', { name: 'Chest press' })).toHaveCount(0);
    await page.getByRole('radio', { name: 'The same' }).check();
    await page.getByRole('button', { name: 'Go on', exact: true }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Chest press' })).toBeVisible();
  });

  await test.step('a jump is answered by the rule, and the truth can be logged all the same', async () => {
    const load = page.getByRole('textbox', { name: /^Weight/ });
    const proposed = await load.inputValue();
    for (const [typed, sentence] of [['500', 'You typed 500; 0 to 150 kg can be kept.'], ['-3', 'You typed -3; 0 to 150 kg can be kept.'], ['abc', 'abc is not a figure.']] as const) {
      await load.fill(typed);
      await page.getByRole('button', { name: 'Next: how it felt' }).click();
      await expect(page.getByText(sentence)).toBeVisible();
      await expect(load).toHaveValue(proposed);
    }
    await load.fill(String(jumpKg).replace('.', ','));
    await load.press('Tab');
    await page.getByRole('button', { name: 'Next: how it felt' }).click();
    const sheet = page.getByRole('dialog');
    await expect(sheet.getByRole('heading')).toHaveText('That is 6 kg more than last time');
    await expect(sheet).toContainText('This log does not replace your clinician’s advice.');
    await expect(sheet.getByRole('button', { name: /^Change to / })).toBeVisible();
    await sheet.getByRole('button', { name: `I have already lifted ${jumpKg} kg` }).click();
    await expect(sheet).toBeHidden();
    await page.getByRole('button', { name: 'Next: seated row' }).click();
    await expect(page.getByText('Choose what comes nearest.')).toBeVisible();
    await page.getByRole('radio', { name: 'Two to four left' }).check();
    await page.getByRole('radio', { name: 'A little' }).check();
    await page.getByRole('button', { name: 'Next: seated row' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Seated row' })).toBeVisible();
  });

  await test.step('kilograms that were read off in pounds are noticed', async () => {
    const load = page.getByRole('textbox', { name: /^Weight/ });
    await load.fill(String(asPounds));
    await load.press('Tab');
    await expect(page.getByText('about what you lifted last time. Did you read pounds?')).toBeVisible();
    await page.getByRole('button', { name: 'Change to pounds' }).click();
    await expect(page.getByText('Did you read pounds?')).toHaveCount(0);
    await page.getByRole('button', { name: 'Less' }).first().click();
    await page.getByRole('button', { name: 'Next: how it felt' }).click();
    await page.getByRole('radio', { name: 'Five or more left' }).check();
    await page.getByRole('button', { name: 'Next: biceps curl' }).click();
    await page.getByRole('button', { name: 'I did not do this one' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Your session' })).toBeVisible();
  });

  await test.step('without a line it waits on the phone', async () => {
    await context.setOffline(true);
    await page.getByRole('button', { name: /^Save session/ }).click();
    await expect(page.getByRole('alert').filter({ hasText: 'Waiting for the line' })).toContainText('kept on this phone');
    await expect(page.getByText('Chest press')).toBeVisible();
  });

  await test.step('the page goes and comes again: all of it is still there, and goes once when the line is back', async () => {
    const sent: string[] = [];
    page.on('request', (request) => {
      if (request.method() === 'POST' && request.url().endsWith('/api/training')) sent.push(request.headers()['idempotency-key'] ?? '');
    });
    // The page is gone before the line is back, so that nothing is sent from it.
    await page.goto('about:blank');
    await context.setOffline(false);
    // The pages come, what is saved does not arrive.
    await page.route('**/api/training', (route) => (route.request().method() === 'POST' ? route.abort('internetdisconnected') : route.continue()));
    await open(page, '/week');
    await expect(page.getByRole('note').filter({ hasText: 'Not sent yet: kept on this phone.' })).toContainText('A training session.');
    for (const _time of ['taken up', 'and after a reload']) {
      await open(page, '/log');
      await expect(page.getByRole('heading', { level: 1, name: 'Your session' })).toBeVisible();
      await expect(page.getByRole('status').filter({ hasText: 'Not sent yet: kept on this phone.' })).toBeVisible();
      await expect(page.getByText(`${jumpKg} kg,`)).toBeVisible();
      await expect(page.getByRole('alert').filter({ hasText: 'Waiting for the line' })).toBeVisible();
    }
    await page.unroute('**/api/training');
    await page.evaluate(() => window.dispatchEvent(new Event('online')));
    await expect(page.getByRole('heading', { level: 1, name: 'Saved' })).toBeVisible({ timeout: 40_000 });
    expect(sent.length, 'tried on each page, and once more with the line').toBeGreaterThanOrEqual(3);
    expect(new Set(sent).size, 'under one key').toBe(1);
    await expect(page.getByText('That is 6 kg more than last time.')).toBeVisible();
    await expect(page.getByText(/^Call Northmoor on/)).toBeVisible();
  });

  await test.step('nothing of it stays on the phone', async () => {
    await open(page, '/week');
    await expect(page.getByText('kept on this phone')).toHaveCount(0);
    const left = await page.evaluate(
      () =>
        new Promise<number>((resolve, reject) => {
          const request = indexedDB.open('tidemark-unsent');
          request.onerror = () => reject(new Error('The phone’s shelf does not open.'));
          request.onsuccess = () => {
            const count = request.result.transaction('entries').objectStore('entries').count();
            count.onsuccess = () => resolve(count.result);
          };
        }),
    );
    expect(left).toBe(0);
  });

  const after = await ask<Lifting>(page, '/api/lifting');
  expect(after.sessionCount).toBe(before.sessionCount + 1);
  const [logged] = after.sessions;
  expect(logged?.on).toBe(today);
  expect(logged?.sets.map(({ name, typed, unit }) => `${name} ${typed} ${unit}`)).toEqual([`Chest press ${jumpKg} kg`, `Seated row ${Math.ceil(asPounds) - 1} lb`]);
  await open(page, '/my-lifting');
  await expect(page.getByText(`${jumpKg} kg`).first()).toBeVisible();
});

test('a questionnaire is begun, left, taken up where it stood, and sent with one question left out', async ({ page, browser }) => {
  test.setTimeout(120_000);
  await open(page, '/questions');
  await page.getByRole('link', { name: 'How your arm feels' }).first().click();
  const questions = page.getByRole('heading', { level: 1 });
  await expect(questions).toContainText('how swollen did your arm or hand look or feel?');
  await page.getByRole('button', { name: 'Next' }).click();
  await expect(page.getByText('Choose an answer, or leave the question out.')).toBeVisible();
  await page.getByRole('radio', { name: 'Not at all' }).check({ force: true });
  await page.getByRole('button', { name: 'Next' }).click();
  await expect(questions).toContainText('how heavy did your arm feel?');
  const kept = page.waitForResponse((response) => response.url().includes('/api/questionnaires/') && response.request().method() === 'PUT');
  await page.getByRole('button', { name: 'Leave out' }).click();
  expect((await kept).ok()).toBe(true);
  await expect(questions).toContainText('how tight or hard did the skin of your arm feel?');

  await test.step('another device goes on where this one stopped', async () => {
    const other = await browser.newContext({ storageState: signedIn('participant-one') });
    const second = await other.newPage();
    await second.goto(page.url());
    await expect(second.getByRole('heading', { level: 1 })).toContainText('how tight or hard did the skin of your arm feel?');
    await other.close();
  });

  for (let left = 0; left < 12; left += 1) {
    if (await page.getByRole('button', { name: 'Send my answers' }).isVisible()) break;
    const said = await questions.textContent();
    await page.getByRole('radio').first().check({ force: true });
    await page.getByRole('button', { name: 'Next' }).click();
    await expect(questions).not.toHaveText(said ?? '');
  }
  await page.getByRole('radio').first().check({ force: true });
  await page.getByRole('button', { name: 'Send my answers' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Sent' })).toBeVisible();
  const address = page.url();
  const { state, answers } = await ask<{ state: string; answers: Record<string, unknown> }>(page, `/api/questionnaires/${new URL(address).pathname.split('/').at(-1)}`);
  expect(state).toBe('submitted');
  expect(answers['swelling']).toBe(0);
  expect(answers['heaviness']).not.toBe(0);
  await page.goto(address);
  await expect(page.getByText('Your answers are in and closed.')).toBeVisible();
});

test('a change in the arm with a red flag says what to do before anything is sent, and holds the training', async ({ page, as }) => {
  test.setTimeout(120_000);
  const code = await codeOf(page);
  let sent = 0;
  page.on('request', (request) => {
    if (request.method() === 'POST' && request.url().endsWith('/api/symptoms')) sent += 1;
  });
  await open(page, '/week');
  await page.getByRole('link', { name: 'Get urgent care' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'First: is any of this so?' })).toBeVisible();
  await page.getByRole('checkbox', { name: 'Arm or chest hot to the touch' }).check();
  await page.getByRole('checkbox', { name: 'Fever of 38 °C or more' }).check();
  await expect(page.getByText('Get medical care today.')).toBeVisible();
  await expect(page.getByText('Nobody reads reports around the clock. If you feel in danger, do not wait for us.').first()).toBeVisible();
  await page.getByRole('checkbox', { name: 'Short of breath' }).check();
  await expect(page.getByText('Call your local emergency number now.')).toBeVisible();
  expect(sent, 'the advice stands before anything is sent').toBe(0);
  await page.getByRole('button', { name: 'Send to Northmoor' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Sent' })).toBeVisible();
  await expect(page.getByText('Northmoor has your report.')).toBeVisible();
  expect(sent).toBe(1);
  await open(page, '/week');
  await expect(page.getByText('Please hold your training.')).toBeVisible();

  await test.step('it stands on the coordinator’s Today with its clock', async () => {
    const coordinator = await as('coordinator');
    await coordinator.goto('/today');
    const report = coordinator.getByRole('main').getByText(code).first();
    await expect(report).toBeVisible();
    const { urgent } = await ask<{ urgent: readonly { code: string }[] }>(coordinator, '/api/today');
    expect(urgent.map((each) => each.code)).toContain(code);
  });
});
