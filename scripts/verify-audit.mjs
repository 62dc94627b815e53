/**
 * Checks the audit trail against its seals, without the application: `npm run audit:verify`.
 * Reads OWNER_DATABASE_URL, recomputes the Merkle tree of RFC 6962 over every row and compares each sealed head.
 * Exits 1 and names the first seal that does not hold, with the rows it covers.
 */
import { createHash } from 'node:crypto';
import { fileURLToPath } from 'node:url';
import pg from 'pg';

const sha256 = (...parts) => parts.reduce((hash, part) => hash.update(part), createHash('sha256')).digest();
const leafHash = (entry) => sha256(Buffer.from([0]), entry);
const nodeHash = (left, right) => sha256(Buffer.from([1]), left, right);
const leafSql = `jsonb_build_array(id, extract(epoch from at)::text, txid::text, actor_id, role, site_id, participant_id, act, reason, request, table_name, row_id, op, before, after, identity)::text`;

/** @returns {Promise<{ ok: boolean, sentence: string }>} */
export async function verifyAudit(connectionString) {
  const client = new pg.Client({ connectionString });
  await client.connect();
  try {
    const { rows: seals } = await client.query('select tree_size::text, last_entry_id::text, root_hash, below_txid::text, sealed_at from seal order by id');
    await client.query('begin');
    await client.query(`declare trail no scroll cursor for select id::text, ${leafSql} as leaf from audit_entry order by audit_entry.txid, audit_entry.id`);
    let peaks = [];
    let size = 0;
    let firstId = null;
    let waiting = [...seals];
    for (;;) {
      const { rows } = await client.query('fetch 5000 from trail');
      for (const row of rows) {
        firstId ??= row.id;
        let node = leafHash(row.leaf);
        for (let left = size; left % 2 === 1; left = (left - 1) / 2) node = nodeHash(peaks.pop(), node);
        peaks = [...peaks, node];
        size += 1;
        while (waiting.length > 0 && Number(waiting[0].tree_size) === size) {
          const seal = waiting.shift();
          const root = peaks.reduceRight((right, leftNode) => nodeHash(leftNode, right)).toString('hex');
          if (root !== seal.root_hash)
            return { ok: false, sentence: `Broken: the seal over ${size} entries (${seal.sealed_at.toISOString()}) does not hold. A row between entry ${firstId} and entry ${row.id} was changed, added or removed after it was sealed.` };
          firstId = null;
        }
      }
      if (rows.length < 5000) break;
    }
    if (waiting.length > 0) return { ok: false, sentence: `Broken: ${waiting[0].tree_size} entries were sealed, only ${size} are there.` };
    return { ok: true, sentence: `Unbroken: ${size} entries, ${seals.length} seals hold; ${size - Number(seals.at(-1)?.tree_size ?? 0)} entries wait for the next seal.` };
  } finally {
    await client.end();
  }
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const url = process.env.OWNER_DATABASE_URL;
  if (!url) {
    console.error('OWNER_DATABASE_URL is not set: it should hold the postgresql:// address of the role that owns the tables.');
    process.exit(1);
  }
  const { ok, sentence } = await verifyAudit(url);
  console.log(sentence);
  process.exit(ok ? 0 : 1);
}
