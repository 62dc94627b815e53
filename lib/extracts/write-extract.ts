import { Readable, Transform } from 'node:stream';
import type { ExtractDisclosure, ExtractFile } from '@/entities/extract';
import type { Storage } from '@/lib/storage/storage';
import type { Work } from '@/lib/work/work';
import { choosePeople, type PeopleCounts } from './choose-people';
import { cleanCell } from './clean-cell';
import { codebookColumns, codebookOf } from './codebook';
import { columnsFor, type ExtractColumn } from './define-extract-file';
import { readPeopleSafely } from './disclosure';
import { extractFiles } from './files';
import { participants } from './files/participants';
import type { ExtractFormat } from './formats/define-extract-format';
import type { Profile } from './input';
import { keepFile } from './keep-file';
import { streamFile } from './read-file';

export interface WriteExtract {
  readonly profile: Profile;
  readonly format: ExtractFormat;
  /** Folder of this attempt in the file store. */
  readonly folder: string;
  readonly storage: Storage;
  /** Called with 0 to 1 after each file. */
  onProgress(share: number): Promise<void>;
  /** Called with every key before it is written, so that a failed attempt can be cleared away. */
  onKey(storageKey: string): void;
}

const cleaner = (columns: readonly ExtractColumn[]): Transform =>
  new Transform({
    objectMode: true,
    transform(row: Record<string, unknown>, _encoding, done) {
      done(null, Object.fromEntries(columns.map((column) => [column.name, cleanCell(column, row[column.name])])));
    },
  });

const checksums = (files: readonly ExtractFile[]): string => files.map(({ name, sha256 }) => `${sha256}  ${name}\n`).join('');

/**
 * Writes every file of one extract from one moment of the record: the transaction of `work` is repeatable read. The data
 * files, then the codebook, then the checksums over all of them.
 */
export async function writeExtract(work: Work, { profile, format, folder, storage, onProgress, onKey }: WriteExtract): Promise<{ files: ExtractFile[]; counts: PeopleCounts; disclosure: ExtractDisclosure }> {
  // The planner cannot know how many people a list holds or how many rows row security lets through, and would go through the
  // numbered sessions once for every set. Without its loops a plan looks dear, and compiling it would cost more than it saves.
  await work.sql(`select set_config('enable_nestloop', 'off', true), set_config('jit', 'off', true)`);
  const { people, counts } = await choosePeople(work);
  const { rows, disclosure } = await readPeopleSafely(work, profile, people);
  const files: ExtractFile[] = [];
  const keep = async (name: string, contentType: string, rows: Readable, through: readonly Transform[]) => {
    const storageKey = `${folder}/${name}`;
    onKey(storageKey);
    files.push(await keepFile(storage, { name, storageKey, contentType, rows, through }));
    await onProgress(files.length / (extractFiles.length + 2));
  };
  for (const file of extractFiles) {
    const columns = columnsFor(file, profile);
    const [source, clean] = file === participants ? [Readable.from(rows), []] : [streamFile(work, file, profile, people), [cleaner(columns)]];
    await keep(`${file.name}.${format.extension}`, format.contentType, source, [...clean, format.write(columns.map(({ name }) => name))]);
  }
  await keep(`codebook.${format.extension}`, format.contentType, Readable.from(codebookOf(profile, format.extension, disclosure)), [format.write(codebookColumns)]);
  await keep('checksums.txt', 'text/plain; charset=utf-8', Readable.from([checksums(files)]), []);
  return { files, counts, disclosure };
}
