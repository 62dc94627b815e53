import { cpSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Client } from 'pg';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { append, emptyTree, leafHash, rootOf } from '@/lib/audit/merkle';
import { leafSql } from '@/lib/audit/seal-trail';
import { systemActor } from '@/lib/auth/roles';
import { env } from '@/lib/env';
import { auditSeal } from '@/lib/jobs/handlers/audit-seal';
import { storage } from '@/lib/storage';
import type { Storage } from '@/lib/storage/storage';
import { withWork } from '@/lib/work/with-work';
import { verifyAudit } from '@/scripts/verify-audit.mjs';
import { jobDeps } from '../given';

let owner: Client;
const ownerUrl = () => process.env['OWNER_DATABASE_URL'] ?? '';
const copies: string[] = [];

beforeAll(async () => {
  owner = new Client({ connectionString: ownerUrl() });
  await owner.connect();
});
afterAll(async () => {
  for (const copy of copies) rmSync(copy, { recursive: true, force: true });
  await owner.end();
});

/** Where the job keeps the heads, as the check reads them. */
function heads(): string {
  const settings = env().STORAGE;
  if (settings.kind !== 'folder') throw new Error('Tests keep files in a folder.');
  return join(settings.path, 'content', 'seals');
}

/** A copy of the heads, as one would take it out of reach. */
function copyOfHeads(): string {
  const copy = mkdtempSync(join(tmpdir(), 'tidemark-heads-'));
  copies.push(copy);
  cpSync(heads(), copy, { recursive: true });
  return copy;
}

/** Writes rows that the trail watches. */
const write = (count: number) =>
  withWork(systemActor(), 'account.join', (work) =>
    work.sql(`insert into account (kind, label) select 'staff', 'T-' || n from generate_series(1, ?) n`, [count]),
  );
const seal = (files: Storage = storage()) => auditSeal.run({}, { ...jobDeps(() => Promise.resolve()), storage: files });
const sealedSize = async (): Promise<number> => (await owner.query<{ size: number }>('select coalesce(max(tree_size), 0)::int as size from seal')).rows[0]?.size ?? 0;
const entryCount = async (): Promise<number> => Number((await owner.query<{ n: string }>('select count(*) as n from audit_entry')).rows[0]?.n);
const verify = (folder = heads()) => verifyAudit(ownerUrl(), { folder });

/** Seals until every entry is covered: a transaction that runs elsewhere in the cluster holds the horizon back for a while. */
async function sealAll(): Promise<number> {
  for (let tries = 0; tries < 120; tries += 1) {
    await seal();
    const size = await sealedSize();
    if (size >= (await entryCount())) return size;
    await new Promise((resolve) => setTimeout(resolve, 250));
  }
  throw new Error('The seal did not reach the newest entries.');
}

/** What the owner of the data base can do to trail and seals: switch the guards off and on again. */
async function asTamperer(change: () => Promise<unknown>): Promise<void> {
  for (const table of ['audit_entry', 'seal']) await owner.query(`alter table ${table} disable trigger user`);
  await change();
  for (const table of ['audit_entry', 'seal']) await owner.query(`alter table ${table} enable trigger user`);
}

/** Makes every seal of the data base agree with the rows as they are now. */
async function rewriteSeals(): Promise<void> {
  const { rows } = await owner.query<{ leaf: string }>(`select ${leafSql} as leaf from audit_entry order by audit_entry.txid, audit_entry.id`);
  const { rows: seals } = await owner.query<{ size: number }>('select tree_size::int as size from seal order by tree_size');
  let tree = emptyTree;
  for (const { leaf } of rows) {
    tree = append(tree, leafHash(leaf));
    if (seals.some(({ size }) => size === tree.size))
      await owner.query('update seal set root_hash = $2, peaks = $3 where tree_size = $1', [tree.size, rootOf(tree).toString('hex'), tree.peaks.map((peak) => peak.toString('hex'))]);
  }
}

test('without a seal, and without a head, nothing is proven', async () => {
  expect(await verify()).toMatchObject({ ok: false, sentence: expect.stringMatching(/^Broken: there is no head in .*seals/) as string });
  const invented = mkdtempSync(join(tmpdir(), 'tidemark-heads-'));
  copies.push(invented);
  writeFileSync(join(invented, '000000000001.json'), JSON.stringify({ treeSize: 1, rootHash: '0'.repeat(64), sealedAt: 'x' }));
  expect(await verify(invented)).toEqual({ ok: false, sentence: 'Broken: there is no seal in the data base.' });
});

test('seals grow with the trail and hold, each with its head; the check says what it proved and against what', async () => {
  await write(7);
  const first = await sealAll();
  expect(first).toBeGreaterThanOrEqual(7);
  await seal();
  expect(await sealedSize()).toBe(first);
  await write(12);
  expect(await sealAll()).toBe(first + 12);
  const { ok, sentence } = await verify();
  expect(sentence, String(ok)).toMatch(/^Unbroken/);
  expect(sentence).toMatch(new RegExp(`^Unbroken: ${first + 12} entries, \\d+ seals hold\\.\\nProven against \\d+ heads in .*seals: the first ${first + 12} entries`));
  expect(sentence).toMatch(/could forge both/);
});

describe('the application’s login', () => {
  const insert = async (columns: string, values: string) => {
    const app = new Client({ connectionString: process.env['DATABASE_URL'] });
    await app.connect();
    await app.query('begin');
    await app.query(`select set_config('app.actor', '00000000-0000-4000-8000-000000000001', true)`);
    try {
      await app.query(`insert into seal (tree_size, last_entry_id, below_txid, root_hash, peaks${columns.includes(')') ? columns : `${columns})`} values (${values})`);
    } finally {
      await app.query('rollback');
      await app.end();
    }
  };
  const root = `repeat('0', 64), '{}'`;
  const xmin = 'pg_snapshot_xmin(pg_current_snapshot())';

  test.each([
    ['an invented size', '', `999999999, 999999999, ${xmin}, ${root}`, /every final entry/],
    ['a transaction to come', '', `(select max(tree_size) + 1 from seal), 1, '999999999', ${root}`, /only what is final/],
    ['a size that was sealed before', '', `(select max(tree_size) from seal), (select max(last_entry_id) from seal), (select max(below_txid) from seal), ${root}`, /every final entry/],
    ['fewer entries than the last', '', `1, 1, '3', ${root}`, /every final entry/],
    ['a moment of its own', ', sealed_at', `1, 1, '3', ${root}, '2020-01-01'`, /permission denied/],
    ['a number of its own', ', id', `1, 1, '3', ${root}, 999999999`, /non-DEFAULT value/],
    ['a number of its own all the same', ', id) overriding system value', `1, 1, '3', ${root}, 999999999`, /permission denied/],
  ])('cannot seal %s', async (_what, columns, values, why) => {
    await write(1);
    await expect(insert(columns, values)).rejects.toThrow(why);
    expect(await sealAll()).toBe(await entryCount());
    expect((await verify()).ok).toBe(true);
  });
});

describe('heads', () => {
  test('that a failed try did not keep are kept by the next one', async () => {
    await write(3);
    const broken: Storage = { ...storage(), put: () => Promise.reject(new Error('The disk is full.')) };
    const before = await sealedSize();
    for (let tries = 0; (await sealedSize()) === before && tries < 120; tries += 1) {
      await seal(broken).catch(() => undefined);
      if ((await sealedSize()) === before) await new Promise((resolve) => setTimeout(resolve, 250));
    }
    expect(await verify()).toMatchObject({ ok: false, sentence: expect.stringMatching(/has no head/) as string });
    await write(2);
    await sealAll();
    expect((await verify()).ok).toBe(true);
  });

  test('may not have a gap or be unreadable', async () => {
    const [gap, spoilt, renamed] = [copyOfHeads(), copyOfHeads(), copyOfHeads()];
    const [, second = '', third = ''] = readdirSync(gap).toSorted();
    rmSync(join(gap, second));
    expect((await verify(gap)).sentence).toMatch(/^Broken: the seal over \d+ entries .* has no head/);
    expect((await verifyAudit(ownerUrl(), { folder: gap, isCopy: true })).ok).toBe(false);
    writeFileSync(join(spoilt, second), '{');
    expect((await verify(spoilt)).sentence).toMatch(/cannot be read/);
    cpSync(join(renamed, third), join(renamed, second));
    expect((await verify(renamed)).sentence).toMatch(/cannot be read/);
  });

  test('of an older copy prove what they cover, and the check says what they do not', async () => {
    const copy = copyOfHeads();
    const covered = await sealedSize();
    await write(5);
    const size = await sealAll();
    const { ok, sentence } = await verifyAudit(ownerUrl(), { folder: copy, isCopy: true });
    expect(ok).toBe(true);
    expect(sentence).toMatch(new RegExp(`the first ${covered} entries are as they were`));
    expect(sentence).toMatch(new RegExp(`Not proven by these heads: ${size - covered} entries`));
    // In the store itself every seal must have its head.
    expect((await verify(copy)).ok).toBe(false);
  });
});

describe('an owner who switches the guards off', () => {
  const edit = (label: string) => owner.query(`update audit_entry set after = jsonb_set(after, '{label}', to_jsonb($1::text)) where id = (select min(id) from audit_entry)`, [label]);
  const label = async () => (await owner.query<{ label: string }>(`select after ->> 'label' as label from audit_entry order by id limit 1`)).rows[0]?.label ?? '';

  test('and edits a row is told by the seals, which name the range', async () => {
    const was = await label();
    await asTamperer(() => edit('T-99'));
    expect(await verify()).toMatchObject({ ok: false, sentence: expect.stringMatching(/does not hold. A row between entry \d+ and entry \d+/) as string });
    await asTamperer(() => edit(was));
    expect((await verify()).ok).toBe(true);
  });

  test('and rewrites rows and seals together is told by the heads, by the job and by a copy', async () => {
    const was = await label();
    const copy = copyOfHeads();
    await asTamperer(async () => {
      await edit('T-99');
      await rewriteSeals();
    });
    for (const verdict of [await verify(), await verifyAudit(ownerUrl(), { folder: copy, isCopy: true })])
      expect(verdict).toMatchObject({ ok: false, sentence: expect.stringMatching(/^Broken: the seal over \d+ entries in the data base is not the one whose head was kept/) as string });
    await expect(seal()).rejects.toThrow(/names another root/);
    await asTamperer(async () => {
      await edit(was);
      await rewriteSeals();
    });
    expect((await verify()).ok).toBe(true);
  });

  test('and removes the newest seal and its rows is told by its head', async () => {
    await write(1);
    await sealAll();
    const kept = await owner.query(`select * from seal order by tree_size desc limit 1`);
    const row = kept.rows[0] as { id: string; tree_size: string; last_entry_id: string; below_txid: string; root_hash: string; peaks: string[]; sealed_at: Date };
    await asTamperer(() => owner.query('delete from seal where id = $1', [row.id]));
    expect(await verify()).toMatchObject({ ok: false, sentence: expect.stringMatching(/but the data base has no such seal/) as string });
    await asTamperer(() =>
      owner.query('insert into seal overriding system value values ($1, $2, $3, $4, $5, $6, $7)', [row.id, row.tree_size, row.last_entry_id, row.below_txid, row.root_hash, row.peaks, row.sealed_at]),
    );
    expect((await verify()).ok).toBe(true);
    await asTamperer(() => owner.query('delete from audit_entry where id = (select max(id) from audit_entry)'));
    expect((await verify()).sentence).toMatch(/entries were sealed, only \d+ are there/);
  });
});

test('rows are sealed in the order of numbers, across a power of ten and across batches', async () => {
  // 12 000 rows of one transaction: ids of three to five digits, read in batches of 5 000.
  await asTamperer(async () => {
    await owner.query('delete from audit_entry');
    await owner.query('delete from seal');
  });
  rmSync(heads(), { recursive: true });
  await write(12_000);
  expect(await sealAll()).toBe(12_000);
  const [first] = (await owner.query<{ id: string }>('select min(id)::text as id from audit_entry')).rows;
  expect(Number(first?.id)).toBeLessThan(1000);
  expect((await verify()).sentence).toMatch(/^Unbroken: 12000 entries/);
  const { rows } = await owner.query<{ hashes: string[] }>(`select array_agg(leaf order by txid, id) as hashes from (select txid, id, ${leafSql} as leaf from audit_entry) t`);
  const tree = (rows[0]?.hashes ?? []).reduce((grown, leaf) => append(grown, leafHash(leaf)), emptyTree);
  const sealed = await owner.query<{ root_hash: string }>('select root_hash from seal order by id desc limit 1');
  expect(sealed.rows[0]?.root_hash).toBe(rootOf(tree).toString('hex'));
});
