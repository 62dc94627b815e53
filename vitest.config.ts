import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('.', import.meta.url)).replace(/\/$/, '');
const resolve = {
  alias: {
    '@': root,
    // 'server-only' throws outside a React server build; tests are the server.
    'server-only': `${root}/tests/server-only.ts`,
  },
};

export default defineConfig({
  resolve,
  test: {
    maxWorkers: 2,
    projects: [
      { resolve, test: { name: 'unit', include: ['tests/unit/**/*.test.ts', 'tests/house.test.ts'], testTimeout: 60_000 } },
      {
        resolve,
        test: {
          name: 'db',
          include: ['tests/db/**/*.test.ts'],
          globalSetup: ['tests/db/global-setup.ts'],
          setupFiles: ['tests/db/per-file.ts'],
          pool: 'forks',
          testTimeout: 60_000,
          hookTimeout: 60_000,
        },
      },
    ],
  },
});
