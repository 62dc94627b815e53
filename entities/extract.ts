import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';
import { lawful } from './lawful';

/** A de-identified data set that left the house, with what was removed and the checksums. */
export const ExtractSchema = defineEntity({
  name: 'Extract',
  tableName: 'extract',
  properties: {
    ...base(),
    studyId: p.uuid(),
    number: p.bigint('number').defaultRaw('identity'),
    profile: p.enum(['open', 'controlled']),
    purpose: p.string(),
    recipient: p.string(),
    asOf: p.datetime(),
    state: p.enum(['waiting', 'preparing', 'ready', 'failed']),
    progress: p.integer(),
    files: p.json<ExtractFile[]>(),
    removed: p.json<string[]>(),
    counts: p.json<Record<string, number>>(),
    disclosure: p.json<ExtractDisclosure>().nullable(),
    failure: p.string().nullable(),
    requestedBy: p.uuid(),
    requestedLabel: p.string(),
    requestedAt: p.datetime(),
    readyAt: p.datetime().nullable(),
  },
});
export type Extract = InferEntity<typeof ExtractSchema>;

/** How far people can be told apart by the marked columns of the people's file, and what had to be withheld for it. */
export interface ExtractDisclosure {
  /** Fewest people who must share every marked value. */
  readonly atLeast: number;
  readonly people: number;
  /** Size of the smallest group in the file as written. */
  readonly smallestGroup: number;
  readonly peopleWithAny: number;
  /** Marked columns in the order of withholding, with the values withheld. */
  readonly withheld: readonly { readonly column: string; readonly label: string; readonly values: number }[];
}

/** One file of an extract as the ledger keeps it. */
export interface ExtractFile {
  readonly name: string;
  readonly storageKey: string;
  readonly rowCount: number;
  readonly byteCount: number;
  readonly sha256: string;
}

/** The worker takes it in hand: the first time, after a failure, or after a worker that stopped half way. */
export function startExtract(extract: Extract): Extract {
  lawful(extract.state !== 'ready', 'This extract is ready and is not made again.');
  extract.state = 'preparing';
  extract.progress = 0;
  extract.failure = null;
  return extract;
}

/** `share` from 0 to 1; kept as percent while it is being prepared. */
export function reportProgress(extract: Extract, share: number): void {
  if (extract.state === 'preparing') extract.progress = Math.min(99, Math.floor(share * 100));
}

/** Names the files. False when another attempt was first: its files stand and these must go. */
export function finishExtract(extract: Extract, made: { files: ExtractFile[]; counts: Record<string, number>; disclosure: ExtractDisclosure; removed: string[]; asOf: Date; at: Date }): boolean {
  if (extract.state === 'ready') return false;
  Object.assign(extract, { files: made.files, counts: made.counts, disclosure: made.disclosure, removed: made.removed, asOf: made.asOf, readyAt: made.at, state: 'ready', progress: 100, failure: null });
  return true;
}

/** An attempt failed; a ready extract stays ready. */
export function failExtract(extract: Extract, sentence: string): void {
  if (extract.state === 'ready') return;
  extract.state = 'failed';
  extract.failure = sentence;
}

/** Somebody asks once more for what failed. */
export function askAgain(extract: Extract): void {
  lawful(extract.state === 'failed', 'Only an extract that failed can be tried again.');
  extract.state = 'waiting';
  extract.progress = 0;
  extract.failure = null;
}
