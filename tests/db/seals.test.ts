import { Client } from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { sealTrail } from '@/lib/audit/seal-trail';
import { systemActor } from '@/lib/auth/roles';
import { withWork } from '@/lib/work/with-work';
import { verifyAudit } from '@/scripts/verify-audit.mjs';

let owner: Client;
const ownerUrl = () => process.env['OWNER_DATABASE_URL'] ?? '';

beforeAll(async () => {
  owner = new Client({ connectionString: ownerUrl() });
  await owner.connect();
});
afterAll(() => owner.end());

/** Writes rows that the trail watches. */
const write = (count: number) =>
  withWork(systemActor(), 'account.join', (work) =>
    work.sql(`insert into account (kind, label) select 'staff', 'T-' || n from generate_series(1, ?) n`, [count]),
  );
const seal = () => withWork(systemActor(), 'job.seal', sealTrail);

/** Seals until so many entries are covered: a transaction that runs elsewhere in the cluster holds the horizon back for a while. */
async function sealTo(entries: number): Promise<number> {
  for (let tries = 0; tries < 120; tries += 1) {
    const { rows } = await owner.query<{ size: number }>('select coalesce(max(tree_size), 0)::int as size from seal');
    const size = rows[0]?.size ?? 0;
    if (size >= entries) return size;
    if ((await seal()) === null) await new Promise((resolve) => setTimeout(resolve, 250));
  }
  throw new Error('The seal did not reach the newest entries.');
}
const entryCount = async (): Promise<number> => Number((await owner.query<{ n: string }>('select count(*) as n from audit_entry')).rows[0]?.n);

test('seals grow with the trail, hold, and name the range in which an owner edited a row', async () => {
  await write(7);
  const first = await sealTo(await entryCount());
  expect(first).toBeGreaterThanOrEqual(7);
  expect(await seal()).toBeNull();
  await write(12);
  expect(await sealTo(await entryCount())).toBe(first + 12);
  expect((await verifyAudit(ownerUrl())).sentence).toMatch(/^Unbroken/);

  // The data base's owner can switch the guard off; the seals still tell.
  await owner.query('alter table audit_entry disable trigger user');
  await owner.query(`update audit_entry set after = jsonb_set(after, '{label}', '"T-99"') where id = (select max(id) from audit_entry)`);
  await owner.query('alter table audit_entry enable trigger user');
  const verdict = await verifyAudit(ownerUrl());
  expect(verdict.ok).toBe(false);
  expect(verdict.sentence).toMatch(/does not hold/);
});

test('a row that disappeared is missed', async () => {
  await owner.query('alter table audit_entry disable trigger user');
  await owner.query(`delete from audit_entry where id = (select max(id) from audit_entry)`);
  await owner.query('alter table audit_entry enable trigger user');
  expect((await verifyAudit(ownerUrl())).ok).toBe(false);
});
