import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { append, emptyTree, leafHash, rootOf, type Tree } from './merkle';

/**
 * What a leaf is made of: every column of the row, as PostgreSQL writes a jsonb array. scripts/verify-audit.mjs
 * reads the same words, so that the trail can be checked without the application.
 */
export const leafSql = `jsonb_build_array(id, extract(epoch from at)::text, txid::text, actor_id, role, site_id, participant_id, act, reason, request, table_name, row_id, op, before, after, identity)::text`;

const batch = 5000;

interface SealRow {
  tree_size: string;
  last_entry_id: string;
  below_txid: string;
  peaks: string[];
}

/** What was sealed. */
export interface Seal {
  readonly treeSize: number;
  readonly rootHash: string;
  /** ISO text. */
  readonly sealedAt: string;
}

const readTree = (row: SealRow | undefined): Tree =>
  row ? { size: Number(row.tree_size), peaks: row.peaks.map((peak) => Buffer.from(peak, 'hex')) } : emptyTree;

/**
 * Seals the trail up to the oldest transaction that still runs: everything below it is final.
 * Rows are taken in the order (txid, id); by id alone a row could commit behind the seal.
 * @returns the new seal, or null when there is nothing new.
 */
export async function sealTrail(work: Work): Promise<Seal | null> {
  await work.sql(`select pg_advisory_xact_lock(hashtext('seal'))`);
  const [last] = await work.sql<SealRow>('select tree_size::text, last_entry_id::text, below_txid::text, peaks from seal order by seal.tree_size desc limit 1');
  const [horizon] = await work.sql<{ xmin: string }>('select pg_snapshot_xmin(pg_current_snapshot())::text as xmin');
  const below = horizon?.xmin ?? '0';
  let tree = readTree(last);
  let from = { txid: last?.below_txid ?? '0', id: '0' };
  // Entries of a later transaction may have lower ids: the highest under the seal never falls.
  let lastId = Number(last?.last_entry_id ?? 0);
  for (;;) {
    // The order names the table's columns: by the bare names it would take the selected texts, and '10' before '9'.
    const rows = await work.sql<{ id: string; txid: string; leaf: string }>(
      `select id::text, txid::text, ${leafSql} as leaf from audit_entry
       where (txid, id) > (?::xid8, ?::bigint) and txid < ?::xid8 order by audit_entry.txid, audit_entry.id limit ${batch}`,
      [from.txid, from.id, below],
    );
    for (const row of rows) {
      tree = append(tree, leafHash(row.leaf));
      lastId = Math.max(lastId, Number(row.id));
    }
    const end = rows.at(-1);
    if (!end || rows.length < batch) break;
    from = { txid: end.txid, id: end.id };
  }
  if (tree.size === Number(last?.tree_size ?? 0)) return null;
  const rootHash = rootOf(tree).toString('hex');
  const [kept] = await work.sql<{ sealed_at: string }>('insert into seal (tree_size, last_entry_id, below_txid, root_hash, peaks) values (?, ?, ?::xid8, ?, ?::text[]) returning sealed_at::text', [
    tree.size,
    lastId,
    below,
    rootHash,
    `{${tree.peaks.map((peak) => peak.toString('hex')).join(',')}}`,
  ]);
  return { treeSize: tree.size, rootHash, sealedAt: moment(kept?.sealed_at ?? '').toISOString() };
}
