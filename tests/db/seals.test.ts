import { Client } from 'pg';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { append, emptyTree, leafHash, rootOf } from '@/lib/audit/merkle';
import { leafSql, sealTrail } from '@/lib/audit/seal-trail';
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

test('rows are sealed in the order of numbers, across a power of ten and across batches', async () => {
  // 12 000 rows of one transaction: ids of four and five digits, read in batches of 5 000.
  await owner.query('alter table audit_entry disable trigger user');
  await owner.query('delete from audit_entry');
  await owner.query('alter table seal disable trigger user');
  await owner.query('delete from seal');
  await owner.query('alter table seal enable trigger user');
  await owner.query('alter table audit_entry enable trigger user');
  await write(12_000);
  await sealTo(12_000);
  const [first] = (await owner.query<{ id: string }>('select min(id)::text as id from audit_entry')).rows;
  expect(Number(first?.id)).toBeLessThan(1000);
  expect((await verifyAudit(ownerUrl())).sentence).toMatch(/^Unbroken: 12000 entries/);
  const { rows } = await owner.query<{ hashes: string[] }>(`select array_agg(leaf order by txid, id) as hashes from (select txid, id, ${leafSql} as leaf from audit_entry) t`);
  const tree = (rows[0]?.hashes ?? []).reduce((grown, leaf) => append(grown, leafHash(leaf)), emptyTree);
  const sealed = await owner.query<{ root_hash: string }>('select root_hash from seal order by id desc limit 1');
  expect(sealed.rows[0]?.root_hash).toBe(rootOf(tree).toString('hex'));
});

test('a row that disappeared is missed', async () => {
  await owner.query('alter table audit_entry disable trigger user');
  await owner.query(`delete from audit_entry where id = (select max(id) from audit_entry)`);
  await owner.query('alter table audit_entry enable trigger user');
  expect((await verifyAudit(ownerUrl())).ok).toBe(false);
});
