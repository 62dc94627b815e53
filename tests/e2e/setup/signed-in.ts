import type { demoAccounts } from '../../../scripts/demo-accounts.mjs';

type Key = (typeof demoAccounts)[number]['key'];

/**
 * The cookies of a demonstration account, for `test.use({ storageState: signedIn('coordinator') })`.
 */
export function signedIn(key: Key): string {
  return `.data/e2e/signed-in/${key}.json`;
}
