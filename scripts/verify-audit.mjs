/**
 * Checks the audit trail against its seals and against the heads kept outside the data base, without the application.
 *
 *   npm run audit:verify                        heads of the file store (STORAGE, else .data/files)
 *   npm run audit:verify -- --heads=<folder>    heads copied elsewhere; entries after the newest of them are not proven
 *
 * Reads OWNER_DATABASE_URL, recomputes the Merkle tree of RFC 6962 over every row, and compares its root at each size with the
 * seal in the data base and with the head. The seals alone prove little: who owns the data base can rewrite rows and seals
 * together, but not a head out of reach. Exits 1 and names the first thing that does not hold.
 */
import { createHash } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import pg from 'pg';

const sha256 = (...parts) => parts.reduce((hash, part) => hash.update(part), createHash('sha256')).digest();
const leafHash = (entry) => sha256(Buffer.from([0]), entry);
const nodeHash = (left, right) => sha256(Buffer.from([1]), left, right);
const leafSql = `jsonb_build_array(id, extract(epoch from at)::text, txid::text, actor_id, role, site_id, participant_id, act, reason, request, table_name, row_id, op, before, after, identity)::text`;

/** Ends the check with what does not hold. */
class Broken extends Error {}

const listNames = (folder) => {
  try {
    return readdirSync(folder);
  } catch (error) {
    if (error.code === 'ENOENT') return [];
    throw error;
  }
};

function readHead(folder, name) {
  const path = join(folder, name);
  try {
    const { treeSize, rootHash, sealedAt } = JSON.parse(readFileSync(path, 'utf8'));
    if (Number.isSafeInteger(treeSize) && treeSize === Number(name.slice(0, 12)) && /^[0-9a-f]{64}$/.test(rootHash)) return { size: treeSize, root: rootHash, at: String(sealedAt) };
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error;
  }
  throw new Broken(`the head ${path} cannot be read as one.`);
}

/** Heads by size, the smallest first. */
function readHeads(folder) {
  const heads = listNames(folder).filter((name) => /^\d{12}\.json$/.test(name)).sort().map((name) => readHead(folder, name));
  if (heads.length === 0) throw new Broken(`there is no head in ${folder}. Without heads kept outside the data base nothing is proven: its owner can rewrite rows and seals together.`);
  return heads;
}

async function readSeals(client) {
  // By the table's number: the bare name would order the selected texts, '9' after '21'.
  const { rows } = await client.query('select tree_size::text, root_hash, sealed_at from seal order by seal.tree_size');
  if (rows.length === 0) throw new Broken('there is no seal in the data base.');
  return rows.map(({ tree_size, root_hash, sealed_at }) => ({ size: Number(tree_size), root: root_hash, at: sealed_at.toISOString() }));
}

/** Each seal has a head of the same root and each head a seal. In a copy, seals after the newest head may lack theirs. */
function pairUp(seals, heads, isCopy) {
  const newest = heads.at(-1);
  const bySize = new Map(heads.map((head) => [head.size, head]));
  for (const seal of seals) {
    const head = bySize.get(seal.size);
    if (head && head.root !== seal.root) throw new Broken(`the seal over ${seal.size} entries in the data base is not the one whose head was kept (${head.at}). The seal was rewritten, or the head.`);
    if (!head && !(isCopy && seal.size > newest.size)) throw new Broken(`the seal over ${seal.size} entries (${seal.at}) has no head. It was removed, or never kept; a seal made a moment ago gets its head within the minute.`);
    bySize.delete(seal.size);
  }
  const [lost] = bySize.values();
  if (lost) throw new Broken(`a head over ${lost.size} entries was kept (${lost.at}), but the data base has no such seal.`);
}

const rootOf = (peaks) => peaks.reduceRight((right, left) => nodeHash(left, right)).toString('hex');

/** Goes through the whole trail and compares its root at each size that was sealed. */
async function compareTrail(client, seals) {
  await client.query(`declare trail no scroll cursor for select id::text, ${leafSql} as leaf from audit_entry order by audit_entry.txid, audit_entry.id`);
  const waiting = [...seals];
  let peaks = [];
  let size = 0;
  let firstId = null;
  for (;;) {
    const { rows } = await client.query('fetch 5000 from trail');
    for (const row of rows) {
      firstId ??= row.id;
      let node = leafHash(row.leaf);
      for (let left = size; left % 2 === 1; left = (left - 1) / 2) node = nodeHash(peaks.pop(), node);
      peaks.push(node);
      size += 1;
      if (waiting[0]?.size !== size) continue;
      const seal = waiting.shift();
      if (rootOf(peaks) !== seal.root)
        throw new Broken(`the seal over ${size} entries (${seal.at}) does not hold. A row between entry ${firstId} and entry ${row.id} was changed, added or removed after it was sealed.`);
      firstId = null;
    }
    if (rows.length < 5000) break;
  }
  if (waiting.length > 0) throw new Broken(`${waiting[0].size} entries were sealed, only ${size} are there.`);
  return size;
}

function proven({ size, seals, heads, folder, isCopy }) {
  const newest = heads.at(-1);
  const later = seals.filter((seal) => seal.size > newest.size).length;
  return [
    `Unbroken: ${size} entries, ${seals.length} seals hold.`,
    `Proven against ${heads.length} heads in ${folder}: the first ${newest.size} entries are as they were when the newest head was kept (${newest.at}).`,
    ...(later > 0 ? [`Not proven by these heads: ${seals.at(-1).size - newest.size} entries under ${later} later seals, which only agree with the data base itself.`] : []),
    `${size - seals.at(-1).size} entries wait for the next seal.`,
    isCopy
      ? 'This holds as far as nobody who can write to the data base could also write to this folder.'
      : 'Whoever can write to both the data base and this folder could forge both: copy the heads out of their reach and give the copy with --heads=<folder>.',
  ].join('\n');
}

/**
 * @param {string} connectionString of the owner of the tables
 * @param {{ folder: string, isCopy?: boolean }} heads `isCopy` for a folder that need not have the newest ones
 * @returns {Promise<{ ok: boolean, sentence: string }>}
 */
export async function verifyAudit(connectionString, { folder, isCopy = false }) {
  const client = new pg.Client({ connectionString });
  await client.connect();
  try {
    // Heads first: one that is kept later than this moment of the data base would look like one whose seal was removed.
    const heads = readHeads(folder);
    await client.query('begin transaction isolation level repeatable read read only');
    const seals = await readSeals(client);
    pairUp(seals, heads, isCopy);
    const size = await compareTrail(client, seals);
    return { ok: true, sentence: proven({ size, seals, heads, folder, isCopy }) };
  } catch (error) {
    if (!(error instanceof Broken)) throw error;
    return { ok: false, sentence: `Broken: ${error.message}` };
  } finally {
    await client.end();
  }
}

/** Where the heads are, from the command line or the settings; null when they must be given. */
function headsFrom(args, storage = 'folder:.data/files') {
  const given = args.find((arg) => arg.startsWith('--heads='))?.slice('--heads='.length);
  if (given) return { folder: given, isCopy: true };
  return storage.startsWith('folder:') ? { folder: join(storage.slice('folder:'.length), 'content', 'seals') } : null;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const url = process.env.OWNER_DATABASE_URL;
  const heads = headsFrom(process.argv.slice(2), process.env.STORAGE || undefined);
  if (!url) console.error('OWNER_DATABASE_URL is not set: it should hold the postgresql:// address of the role that owns the tables.');
  else if (!heads) console.error('The heads are kept in a bucket: copy its folder seals/ and give the copy with --heads=<folder>.');
  if (!url || !heads) process.exit(1);
  const { ok, sentence } = await verifyAudit(url, heads);
  console.log(sentence);
  process.exit(ok ? 0 : 1);
}
