export * from '../lib/people/demo-accounts.mjs';
