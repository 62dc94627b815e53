import { createHash } from 'node:crypto';
import { Readable, Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { ExtractFile } from '@/entities/extract';
import type { Storage } from '@/lib/storage/storage';

/** Text is gathered to this size before it goes on: one chunk a row costs five times as long. */
const chunkBytes = 64 * 1024;

/** Gathers text, and counts and hashes the bytes that pass. */
function gather(): Transform & { result(): { byteCount: number; sha256: string } } {
  const hash = createHash('sha256');
  let byteCount = 0;
  let waiting = '';
  const release = (): Buffer => {
    const bytes = Buffer.from(waiting, 'utf8');
    waiting = '';
    byteCount += bytes.length;
    hash.update(bytes);
    return bytes;
  };
  const stream = new Transform({
    writableObjectMode: true,
    transform(text: string | Buffer, _encoding, done) {
      waiting += String(text);
      done(null, waiting.length >= chunkBytes ? release() : undefined);
    },
    flush(done) {
      done(null, waiting ? release() : undefined);
    },
  });
  return Object.assign(stream, { result: () => ({ byteCount, sha256: hash.digest('hex') }) });
}

/** Keeps one file of an extract while it is made: rows in, bytes into the store. */
export async function keepFile(
  storage: Storage,
  { name, storageKey, contentType, rows, through }: { name: string; storageKey: string; contentType: string; rows: Readable; through: readonly Transform[] },
): Promise<ExtractFile> {
  let rowCount = 0;
  const count = new Transform({
    objectMode: true,
    transform(row, _encoding, done) {
      rowCount += 1;
      done(null, row);
    },
  });
  const bytes = gather();
  const [piped, kept] = await Promise.allSettled([pipeline([rows, count, ...through, bytes]), storage.put(storageKey, bytes, { contentType })]);
  for (const outcome of [piped, kept]) if (outcome.status === 'rejected') throw outcome.reason;
  return { name, storageKey, rowCount, ...bytes.result() };
}
