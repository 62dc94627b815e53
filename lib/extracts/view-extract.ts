import { ExtractSchema, type Extract, type ExtractDisclosure } from '@/entities/extract';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import type { Profile } from './input';

/** One data set of the ledger. Moments are ISO texts. */
export interface ExtractView {
  readonly id: string;
  readonly number: number;
  readonly profile: Profile;
  readonly purpose: string;
  readonly recipient: string;
  readonly state: Extract['state'];
  /** Percent. */
  readonly progress: number;
  readonly failure: string | null;
  readonly requestedLabel: string;
  readonly requestedAt: string;
  /** The moment the record was read, once it was. */
  readonly asOf: string;
  readonly readyAt: string | null;
  readonly counts: Readonly<Record<string, number>>;
  /** Once it is ready. */
  readonly disclosure: ExtractDisclosure | null;
  readonly removed: readonly string[];
  readonly files: readonly { readonly name: string; readonly rowCount: number; readonly byteCount: number; readonly sha256: string }[];
  readonly version: number;
}

export const toExtractView = (extract: Extract): ExtractView => ({
  id: extract.id,
  number: Number(extract.number),
  profile: extract.profile,
  purpose: extract.purpose,
  recipient: extract.recipient,
  state: extract.state,
  progress: extract.progress,
  failure: extract.failure ?? null,
  requestedLabel: extract.requestedLabel,
  requestedAt: extract.requestedAt.toISOString(),
  asOf: extract.asOf.toISOString(),
  readyAt: extract.readyAt?.toISOString() ?? null,
  counts: extract.counts,
  disclosure: extract.disclosure ?? null,
  removed: extract.removed,
  files: extract.files.map(({ name, rowCount, byteCount, sha256 }) => ({ name, rowCount, byteCount, sha256 })),
  version: extract.version,
});

/** @throws Refusal 'not-found' when there is no such extract. */
export async function findExtract(work: Work, id: string): Promise<Extract> {
  const extract = await work.em.findOne(ExtractSchema, { id });
  if (!extract) throw new Refusal('not-found', 'There is no such extract.');
  return extract;
}

/** One extract with its files and checksums. */
export const viewExtract = async (work: Work, { id }: { id: string }): Promise<ExtractView> => toExtractView(await findExtract(work, id));
