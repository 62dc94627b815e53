/**
 * Serves what the browser tests run against until Ctrl-C, for work on a single test in another window:
 *
 *   node scripts/e2e-servers.mjs                  prints two exports
 *   npx playwright test tests/e2e/consent.spec.ts with those exports set
 */
import { ensurePackages } from './set-up/packages.mjs';
import { withTestServers } from './set-up/test-servers.mjs';
import { fail, tell } from './set-up/tell.mjs';

const told = new Promise((resolve) => {
  for (const sign of ['SIGINT', 'SIGTERM']) process.on(sign, resolve);
});

ensurePackages();
withTestServers(async ({ E2E_BASE_URL, E2E_MAIL_URL }) => {
  tell(`export E2E_BASE_URL=${E2E_BASE_URL} E2E_MAIL_URL=${E2E_MAIL_URL}`);
  await told;
}).then(() => process.exit(0), fail);
