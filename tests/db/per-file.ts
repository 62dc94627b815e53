import { randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Client } from 'pg';
import { afterAll, inject } from 'vitest';

/** Each test file works in its own clone of the migrated template, under the application's login. */
const { ownerUrl, appUrl, template } = inject('database');
const clone = `w_${randomBytes(6).toString('hex')}`;
const files = mkdtempSync(join(tmpdir(), 'tidemark-files-'));

function at(url: string): string {
  const address = new URL(url);
  address.pathname = `/${clone}`;
  return address.href;
}

async function asOwner(statement: string): Promise<void> {
  const client = new Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}

await asOwner(`create database ${clone} template ${template} strategy file_copy`);

// Set before the code under test is imported; it reads them when it first needs them.
Object.assign(process.env, {
  DATABASE_URL: at(appUrl),
  OWNER_DATABASE_URL: at(ownerUrl),
  NEXTAUTH_URL: 'http://127.0.0.1:3000',
  NEXTAUTH_SECRET: 'tests-only-tests-only-tests-only-tests-only',
  MAIL_FROM: 'Tidemark <registry@tidemark.example>',
  STORAGE: `folder:${files}`,
  LOG_LEVEL: 'silent',
});

afterAll(async () => {
  // The code under test keeps one pool per process; its connections would hold the clone.
  await (await (globalThis as typeof globalThis & { tidemarkOrm?: Promise<{ close(force: boolean): Promise<void> }> }).tidemarkOrm)?.close(true);
  await asOwner(`drop database if exists ${clone} with (force)`);
  rmSync(files, { recursive: true, force: true });
});
