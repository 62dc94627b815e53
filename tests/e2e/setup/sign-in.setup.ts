import { expect, test } from '@playwright/test';
import { demoAccounts } from '../../../scripts/demo-accounts.mjs';
import { signedIn } from './signed-in';

/** Signs each demonstration account in once over HTTP and keeps its cookies for the journeys. */
for (const { key, email, password } of demoAccounts) {
  test(`${key} signs in`, async ({ request, baseURL }) => {
    const { csrfToken } = (await (await request.get('/api/auth/csrf')).json()) as { csrfToken: string };
    const answer = await request.post('/api/auth/callback/credentials', {
      form: { csrfToken, email, password, callbackUrl: `${baseURL}/`, json: 'true' },
      headers: { origin: String(baseURL) },
    });
    expect(answer.ok()).toBe(true);
    const { cookies } = await request.storageState({ path: signedIn(key) });
    expect(cookies.map(({ name }) => name)).toContain('next-auth.session-token');
  });
}
