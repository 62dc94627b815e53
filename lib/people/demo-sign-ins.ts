import { demoAccounts } from './demo-accounts.mjs';

/** The demonstration's people as the sign-in page shows them. Empty of meaning outside a demonstration: the accounts are not there. */
export const demoSignIns = demoAccounts.map(({ name, roleLabel, siteName, email, password }) => ({
  name,
  role: siteName ? `${roleLabel}, ${siteName}` : roleLabel,
  email,
  password,
}));
