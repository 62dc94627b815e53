import { addDays } from '@/instruments/calendar';
import { localDate, moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { rootOf } from './merkle';

/** How far the trail is sealed, and what was written lately in reach. */
export interface ProofView {
  readonly seal: { readonly treeSize: number; readonly lastEntryId: number; readonly rootHash: string; readonly sealedAt: string } | null;
  /** The last seal's parts give its root; false would mean that the seal itself was altered. */
  readonly isSound: boolean;
  readonly today: string;
  readonly days: readonly { readonly day: string; readonly entries: number }[];
}

const daysShown = 60;

/** The state of the proof: two statements. Recomputing it from every entry is scripts/verify-audit.mjs, outside the application. */
export async function viewProof(work: Work): Promise<ProofView> {
  const today = localDate(work.now, 'UTC');
  const from = addDays(today, 1 - daysShown);
  const [seal] = await work.sql<{ tree_size: string; last_entry_id: string; root_hash: string; peaks: string[]; sealed_at: string }>(
    'select tree_size::text, last_entry_id::text, root_hash, peaks, sealed_at::text from seal order by id desc limit 1',
  );
  const counts = await work.sql<{ day: string; entries: number }>(
    `select (at at time zone 'UTC')::date::text as day, count(*)::int as entries from audit_entry where at >= ?::date::timestamp at time zone 'UTC' group by 1`,
    [from],
  );
  const byDay = new Map(counts.map(({ day, entries }) => [day, entries]));
  return {
    seal: seal ? { treeSize: Number(seal.tree_size), lastEntryId: Number(seal.last_entry_id), rootHash: seal.root_hash, sealedAt: moment(seal.sealed_at).toISOString() } : null,
    isSound: !seal || rootOf({ size: Number(seal.tree_size), peaks: seal.peaks.map((peak) => Buffer.from(peak, 'hex')) }).toString('hex') === seal.root_hash,
    today,
    days: Array.from({ length: daysShown }, (_, index) => addDays(from, index)).map((day) => ({ day, entries: byDay.get(day) ?? 0 })),
  };
}
