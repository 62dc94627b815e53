import { lawful } from '@/entities/lawful';
import type { ServedFile } from '@/lib/web/serve-file';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { findExtract } from './view-extract';

/**
 * One file of a ready extract. Each handing out is written to the trail; the bytes are read after the transaction.
 * @throws Refusal 'not-found' when there is no such file, 'conflict' while the extract is not ready.
 */
export async function downloadFile(work: Work, { id, name }: { id: string; name: string }): Promise<ServedFile> {
  const extract = await findExtract(work, id);
  lawful(extract.state === 'ready', 'This extract is not ready yet, so there is no file to save.');
  const file = extract.files.find((one) => one.name === name);
  if (!file) throw new Refusal('not-found', 'There is no such file in this extract.');
  await work.event('extract', extract.id, { file: name, sha256: file.sha256 });
  const contentType = name.endsWith('.csv') ? 'text/csv; charset=utf-8' : 'text/plain; charset=utf-8';
  return { storageKey: file.storageKey, contentType, byteCount: file.byteCount, filename: `extract-${String(extract.number)}-${name}` };
}
