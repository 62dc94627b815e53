/**
 * What a participant typed on this device and the server has not taken yet.
 *
 * It is health data at rest on a phone, so it is little and short: one entry of a kind for one person, removed once the server
 * has it, when the person signs out, when anybody else signs in, and after two weeks. Kept in IndexedDB and not in sessionStorage,
 * because phones do not bring sessionStorage back after the system has closed the browser, which is the loss this is for.
 */
export type UnsentKind = 'session' | 'report';

export interface Unsent<Value = unknown> {
  /** Of the entry's own making: one written by an older page is not read. */
  readonly shape: number;
  /** The participant's id: nobody else is shown it. */
  readonly owner: string;
  readonly kind: UnsentKind;
  /** The key it is sent under, so that what arrived without an answer is not kept twice. */
  readonly key: string;
  readonly keptAt: Date;
  readonly value: Value;
}

/** Where entries lie, one for each owner and kind. */
export interface Shelf {
  all(): Promise<readonly Unsent[]>;
  put(entry: Unsent): Promise<void>;
  remove(owner: string, kind: UnsentKind): Promise<void>;
}

export const unsentShape = 1;
/** Common practice, no source. */
const keptDays = 14;

const isFresh = ({ shape, keptAt }: Unsent, now: Date): boolean => shape === unsentShape && now.getTime() - keptAt.getTime() < keptDays * 86_400_000;

/** Removes what is not this person's, or too old; answers what stays. `null` is anybody who is no participant: nothing stays. */
export async function sweepUnsent(shelf: Shelf, owner: string | null, now: Date): Promise<readonly Unsent[]> {
  const entries = await shelf.all();
  const stays = (entry: Unsent): boolean => entry.owner === owner && isFresh(entry, now);
  for (const entry of entries) if (!stays(entry)) await shelf.remove(entry.owner, entry.kind);
  return entries.filter(stays);
}

/** What this person left of a kind, if anything that can still be read. */
export async function findUnsent(shelf: Shelf, owner: string, kind: UnsentKind, now: Date): Promise<Unsent | null> {
  return (await shelf.all()).find((entry) => entry.owner === owner && entry.kind === kind && isFresh(entry, now)) ?? null;
}
