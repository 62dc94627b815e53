import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { Client } from 'pg';
import type { TestProject } from 'vitest/node';
import { ensureDatabase, keepFile } from '../../scripts/pg.mjs';
import { root } from '../../scripts/set-up/tell.mjs';

declare module 'vitest' {
  interface ProvidedContext {
    database: { ownerUrl: string; appUrl: string; template: string };
  }
}

const cluster = 'pg-test';
/** What decides how a migrated data base looks. */
const sources = ['migrations', 'lib/jobs', 'scripts/migrate.ts', 'mikro-orm.config.ts'];
const templatesKept = 4;

function filesOf(path: string): string[] {
  const full = join(root, path);
  if (!existsSync(full)) return [];
  if (!/\.\w+$/.test(path)) return readdirSync(full).sort().flatMap((name) => filesOf(join(path, name)));
  return [full];
}

function templateName(): string {
  const hash = createHash('sha256');
  for (const file of sources.flatMap(filesOf)) hash.update(file).update(readFileSync(file));
  return `test_template_${hash.digest('hex').slice(0, 12)}`;
}

function at(url: string, database: string): string {
  const address = new URL(url);
  address.pathname = `/${database}`;
  return address.href;
}

function migrate(ownerUrl: string, appUrl: string): void {
  const child = spawnSync(process.execPath, ['--import', 'tsx', '--conditions=react-server', 'scripts/migrate.ts'], {
    cwd: root,
    env: { ...process.env, OWNER_DATABASE_URL: ownerUrl, DATABASE_URL: appUrl },
    encoding: 'utf8',
  });
  if (child.status !== 0) throw new Error(`The tests’ data base could not be migrated:\n${child.stdout}${child.stderr}`);
}

/** Migrates under another name first: a template that exists is complete. */
async function makeTemplate(admin: Client, template: string, ownerUrl: string, appUrl: string): Promise<void> {
  const draft = `${template}_draft`;
  const found = await admin.query('select from pg_database where datname = $1', [template]);
  if (found.rowCount) return;
  await admin.query(`drop database if exists ${draft} with (force)`);
  await admin.query(`create database ${draft}`);
  migrate(at(ownerUrl, draft), at(appUrl, draft));
  await admin.query(`alter database ${draft} rename to ${template}`);
  const old = await admin.query<{ datname: string }>(
    `select datname from pg_database where datname like 'test\\_template\\_%' order by oid desc offset ${templatesKept}`,
  );
  for (const { datname } of old.rows) await admin.query(`drop database if exists ${datname} with (force)`);
}

/**
 * Gives the data base tests a private cluster with a migrated template that each test file clones.
 * Several runs may share the cluster; the last one to leave stops it, unless it was started by hand.
 */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const { ownerUrl, appUrl, stop } = await ensureDatabase({ name: cluster, fsync: false });
  const template = templateName();
  const admin = new Client({ connectionString: ownerUrl });
  await admin.connect();
  try {
    await admin.query(`select pg_advisory_lock(hashtext('test template'))`);
    await makeTemplate(admin, template, ownerUrl, appUrl);
  } finally {
    await admin.end();
  }
  project.provide('database', { ownerUrl, appUrl, template });
  return async () => {
    if (!existsSync(keepFile(cluster)) && (await isAlone(ownerUrl))) stop();
  };
}

async function isAlone(ownerUrl: string): Promise<boolean> {
  const client = new Client({ connectionString: ownerUrl });
  await client.connect();
  const others = await client.query(`select from pg_stat_activity where backend_type = 'client backend' and pid <> pg_backend_pid()`);
  await client.end();
  return others.rowCount === 0;
}
