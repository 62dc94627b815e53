import { expect, type Page } from '@playwright/test';
import { demoAccounts, demoPassword } from '../../lib/people/demo-accounts.mjs';
import { letterTo, linkIn } from './setup/letters';
import { ask, dayFromToday, open, sendTo, signIn, test } from './setup/pages';

const account = (wanted: string) => demoAccounts.find(({ key }) => key === wanted) ?? { email: '', password: '', name: '' };
const coordinator = account('coordinator');
// A run of its own each time, so that the journey can be repeated over the same data base.
const newcomer = { name: 'Thora Wainscott', email: `thora.wainscott.${Date.now()}@post.example` };
const ownPassword = 'quiet harbour walks 27';

const criteria = [
  ['Aged 18 or over', 'Yes'],
  ['Treated for breast cancer on one side', 'Yes'],
  ['Lymph nodes removed, or radiotherapy to them, on that side', 'Yes'],
  ['Wounds healed, and four weeks or more since surgery', 'Yes'],
  ['Both arms can be measured', 'Yes'],
  ['Infection or clot in the arm during the past four weeks', 'No'],
  ['Advised by a clinician not to lift weights', 'No'],
  ['Lymph nodes removed on the other side as well', 'No'],
] as const;

async function answer(page: Page, [criterion, value]: readonly [string, string]): Promise<void> {
  const saved = page.waitForResponse((response) => response.url().endsWith('/answers') && response.request().method() === 'PUT');
  await page.getByRole('group', { name: criterion }).getByRole('radio', { name: value, exact: true }).check();
  expect((await saved).ok()).toBe(true);
}

/** Reads each part of the form and stops before the signature. */
async function readAllParts(page: Page): Promise<void> {
  for (let part = 1; part <= 7; part += 1) {
    await expect(page.getByText(`Part ${part} of 7`)).toBeVisible();
    await page.getByRole('button', { name: 'I have read this' }).click();
  }
  await expect(page.getByRole('heading', { level: 1, name: 'Your agreement' })).toBeVisible();
}

test('a person is screened, consents on the tablet, is enrolled and opens the invitation', async ({ browser, page }) => {
  test.setTimeout(240_000);
  // The tablet changes this session, so it is one of its own.
  await signIn(page, coordinator);

  await test.step('the coordinator opens a screening', async () => {
    await open(page, '/screening');
    await page.getByRole('link', { name: 'Open a screening' }).click();
    await page.getByLabel('Name', { exact: true }).fill(newcomer.name);
    await page.getByLabel(/^E-mail/).fill(newcomer.email);
    await page.getByLabel(/^Date of birth/).fill('1969-05-14');
    await page.getByRole('group', { name: 'Cohort' }).getByRole('radio', { name: 'At risk of swelling' }).check();
    await page.getByLabel(/^Referred by/).fill('Breast clinic');
    await page.getByRole('button', { name: 'Open the screening' }).click();
    await expect(page.getByRole('heading', { level: 1, name: /^Screening NM-S\d{4} Northmoor$/ })).toBeVisible();
  });
  const screeningPath = new URL(page.url()).pathname;

  await test.step('nothing is enrolled before eligibility and consent', async () => {
    await expect(page.getByText('Eligibility is to be confirmed, and consent is to be completed by both signatures. Nothing is recorded before that.')).toBeVisible();
    await expect(page.getByRole('button', { name: 'Enrol and send the invitation' })).toHaveCount(0);
    const refused = await sendTo(
      page,
      `/api${screeningPath.replace('/screening/', '/screenings/')}/enrol`,
      {
        affectedSide: 'left', dominantSide: 'right', surgeryOn: dayFromToday(-180), surgery: 'mastectomy', axillaryProcedure: 'axillary-dissection', nodesRemoved: '9',
        radiotherapy: 'none', systemicTherapy: 'none', heightCm: '164',
      },
      { 'idempotency-key': crypto.randomUUID() },
    );
    expect(refused.ok()).toBe(false);
  });

  await test.step('eligibility is answered by the coordinator and confirmed by the site investigator', async () => {
    for (const one of criteria.slice(0, -1)) await answer(page, one);
    await expect(page.getByRole('button', { name: 'Confirm eligibility' })).toHaveCount(0);
    const other = await browser.newContext();
    const investigator = await other.newPage();
    await signIn(investigator, account('site-investigator'));
    await open(investigator, screeningPath);
    await investigator.getByRole('button', { name: 'Confirm eligibility' }).click();
    await expect(investigator.getByRole('alert').filter({ hasText: 'Not confirmed' })).toContainText('Not answered yet: Lymph nodes removed on the other side as well.');
    await answer(page, ['Lymph nodes removed on the other side as well', 'Yes']);
    await expect(page.getByText('This stops it: the protocol asks for no.')).toBeVisible();
    await answer(page, ['Lymph nodes removed on the other side as well', 'No']);
    await open(investigator, screeningPath);
    await investigator.getByRole('button', { name: 'Confirm eligibility' }).click();
    await expect(investigator.getByText(/^Confirmed by R-01, /)).toBeVisible();
    await other.close();
    await open(page, screeningPath);
    await expect(page.getByText(/^Confirmed by R-01, /)).toBeVisible();
  });

  await test.step('the tablet is handed over and opens nothing else', async () => {
    await page.getByRole('button', { name: 'Read on the clinic’s tablet' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Hand the tablet over' })).toBeVisible();
    await page.getByRole('button', { name: 'Open the form and hand over' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'The main points' })).toBeVisible();
    expect((await page.request.get('/api/participants')).status()).toBe(403);
    await page.goto('/today');
    await expect(page).toHaveURL(new RegExp(`${screeningPath}/consent$`));
  });

  await test.step('the participant reads every part and signs by typing', async () => {
    await open(page, `${screeningPath}/consent`);
    await readAllParts(page);
    await page.getByRole('button', { name: 'Sign and send' }).click();
    await expect(page.getByRole('alert').filter({ hasText: 'things to mend first' })).toContainText('Sign with a finger, or type your name.');
    for (const box of await page.getByRole('checkbox').all()) await box.check();
    await page.getByRole('group', { name: 'You may ask me about other studies later.' }).getByRole('radio', { name: 'No', exact: true }).check();
    await page.getByRole('group', { name: 'Other researchers may use my data, without my name.' }).getByRole('radio', { name: 'Yes', exact: true }).check();
    await page.getByRole('group', { name: 'You may link my data with my hospital record.' }).getByRole('radio', { name: 'No', exact: true }).check();
    await page.getByRole('button', { name: 'Type your name instead' }).click();
    await page.getByLabel('Type your full name as your signature').fill(newcomer.name);
    await page.getByRole('button', { name: 'Sign and send' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'You have signed' })).toBeVisible();
  });

  await test.step('only the password of its owner takes the tablet back', async () => {
    await page.getByRole('link', { name: 'For Northmoor: take the tablet back' }).click();
    await expect(page.getByRole('heading', { level: 1, name: 'Give the tablet back' })).toBeVisible();
    await page.getByLabel('For the site: your password').fill('not the password at all');
    await page.getByRole('button', { name: 'Take the tablet back' }).click();
    await expect(page.locator('#password')).toHaveAttribute('aria-invalid', 'true');
    expect((await page.request.get('/api/participants')).status()).toBe(403);
    await page.getByLabel('For the site: your password').fill(coordinator.password);
    await page.getByRole('button', { name: 'Take the tablet back' }).click();
    await expect(page.getByRole('heading', { level: 1, name: /^Screening NM-S\d{4}/ })).toBeVisible();
  });

  await test.step('the coordinator signs second and the copy goes out as a PDF', async () => {
    await page.getByRole('checkbox').check();
    await page.getByLabel('Type your full name as your signature').fill(coordinator.name);
    await page.getByLabel('Your password').fill('not the password at all');
    await page.getByRole('button', { name: 'Sign second' }).click();
    await expect(page.locator('#password')).toHaveAttribute('aria-invalid', 'true');
    await page.getByLabel('Your password').fill(coordinator.password);
    await page.getByRole('button', { name: 'Sign second' }).click();
    await expect(page.getByText('Consent is complete.')).toBeVisible();
    const copy = await letterTo(newcomer.email, /^Your copy from Northmoor$/);
    expect(copy.attachments.map(({ contentType }) => contentType)).toEqual(['application/pdf']);
  });

  const code = await test.step('the facts enrol the person under a code', async () => {
    await page.getByRole('group', { name: 'Affected side' }).getByRole('radio', { name: 'Left' }).check();
    await page.getByRole('group', { name: 'Dominant hand' }).getByRole('radio', { name: 'Right' }).check();
    await page.getByLabel('Date of surgery').fill(dayFromToday(-180));
    await page.getByLabel('Surgery', { exact: true }).selectOption({ label: 'Mastectomy' });
    await page.getByLabel('Axillary procedure').selectOption({ label: 'Axillary dissection' });
    await page.getByLabel('Nodes removed').fill('9');
    await page.getByLabel('Radiotherapy').selectOption({ label: 'Regional nodes as well' });
    await page.getByLabel('Systemic therapy').selectOption({ label: 'Endocrine therapy only' });
    await page.getByLabel('Height, in cm').fill('1,64');
    await page.getByRole('button', { name: 'Enrol and send the invitation' }).click();
    await expect(page.getByText('1.64 looks like metres. Give the height in centimetres, as 164.').first()).toBeVisible();
    await page.getByLabel('Height, in cm').fill('164');
    await page.getByRole('button', { name: 'Enrol and send the invitation' }).click();
    const link = page.getByRole('link', { name: /^Enrolled as NM-/ });
    await expect(link).toBeVisible();
    return (await link.textContent())?.replace('Enrolled as ', '') ?? '';
  });
  const { visits } = await ask<{ visits: { name: string; state: string }[] }>(page, `/api/participants/${code}`);
  expect(visits.map(({ name, state }) => `${name}, ${state}`)).toEqual(['Baseline', 'Month 3', 'Month 6', 'Month 9', 'Month 12', 'Month 18', 'Month 24'].map((name) => `${name}, to come`));

  await test.step('the participant opens the invitation, sets a password and lands on This week', async () => {
    const invitation = linkIn(await letterTo(newcomer.email, /^Your invitation from Northmoor$/));
    const context = await browser.newContext();
    const own = await context.newPage();
    await open(own, invitation);
    await own.getByLabel('Your password').fill('short');
    await own.getByRole('button', { name: 'Set the password and go in' }).click();
    await expect(own.locator('#password')).toHaveAttribute('aria-invalid', 'true');
    await own.getByLabel('Your password').fill(ownPassword);
    await own.getByRole('button', { name: 'Set the password and go in' }).click();
    await expect(own).toHaveURL(/\/week$/);
    await expect(own.getByRole('heading', { level: 1, name: 'Week 1' })).toBeVisible();
    await expect(own.getByText(code)).toBeVisible();
    await expect(own.getByText('Training begins once both arms have been measured.')).toBeVisible();
    await own.goto(invitation);
    await expect(own.getByRole('heading', { level: 1, name: 'This link does not open' })).toBeVisible();
    await context.close();
  });

  await test.step('the new password signs in, the demonstration’s does not', async () => {
    const context = await browser.newContext();
    const again = await context.newPage();
    await open(again, '/sign-in');
    await again.getByLabel('E-mail').fill(newcomer.email);
    await again.getByLabel('Password', { exact: true }).fill(demoPassword);
    await again.getByRole('button', { name: 'Sign in', exact: true }).click();
    await expect(again.getByRole('alert').filter({ hasText: 'Not signed in' })).toBeVisible();
    await again.getByLabel('Password', { exact: true }).fill(ownPassword);
    await again.getByRole('button', { name: 'Sign in', exact: true }).click();
    await expect(again).toHaveURL(/\/week$/);
    await context.close();
  });
});
