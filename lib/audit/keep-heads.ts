import { json } from 'node:stream/consumers';
import type { Storage } from '@/lib/storage/storage';
import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import type { Seal } from './seal-trail';

/** Name of the head over so many entries. scripts/verify-audit.mjs looks for the same names. */
export const headKey = (treeSize: number): string => `seals/${String(treeSize).padStart(12, '0')}.json`;

interface SealRow {
  tree_size: string;
  root_hash: string;
  sealed_at: string;
}

const page = 200;

/** Seals below a size, the largest first. */
export const readSeals = async (work: Work, { below }: { below: number }): Promise<Seal[]> =>
  (await work.sql<SealRow>(`select tree_size::text, root_hash, sealed_at::text from seal where tree_size < ?::bigint order by seal.tree_size desc limit ${page}`, [below])).map(
    ({ tree_size, root_hash, sealed_at }) => ({ treeSize: Number(tree_size), rootHash: root_hash, sealedAt: moment(sealed_at).toISOString() }),
  );

/** @throws Error when the head that is kept names another root: seals in the data base were rewritten. */
async function compare(storage: Storage, { treeSize, rootHash }: Seal): Promise<void> {
  const kept = (await json(await storage.get(headKey(treeSize)))) as { rootHash?: unknown };
  if (kept.rootHash !== rootHash) throw new Error(`The kept head over ${treeSize} entries names another root than the seal in the data base. Run audit:verify and keep both as they are.`);
}

/**
 * Keeps the head of every seal outside the data base. An earlier try may have failed after its seal was made, so it looks back
 * to the last head that is there; a head that is there is compared and never written again. The oldest is written first: a
 * try that stops half way leaves no hole.
 * @returns how many were written.
 */
export async function keepHeads(storage: Storage, read: (below: number) => Promise<readonly Seal[]>): Promise<number> {
  const missing: Seal[] = [];
  for (let seals = await read(Number.MAX_SAFE_INTEGER); seals.length > 0; seals = await read(seals.at(-1)?.treeSize ?? 0)) {
    const known = await firstKept(storage, seals, missing);
    if (!known) continue;
    await compare(storage, known);
    break;
  }
  for (const seal of missing.toReversed()) await storage.put(headKey(seal.treeSize), Buffer.from(`${JSON.stringify(seal)}\n`), { contentType: 'application/json' });
  return missing.length;
}

/** The first seal whose head is there; those before it are added to `missing`. */
async function firstKept(storage: Storage, seals: readonly Seal[], missing: Seal[]): Promise<Seal | null> {
  for (const seal of seals) {
    if (await storage.head(headKey(seal.treeSize))) return seal;
    missing.push(seal);
  }
  return null;
}
