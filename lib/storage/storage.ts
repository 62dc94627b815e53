import type { Readable } from 'node:stream';

/** What is known of a kept file without reading it. */
export interface FileHead {
  sizeBytes: number;
  contentType: string;
}

/** The one way to keep files. Keys are paths of plain names, such as `consent/0f3c…/signed.pdf`; see `checkKey`. */
export interface Storage {
  /** Keeps the whole of `body` under `key` or nothing at all; an earlier file of that key is replaced. */
  put(key: string, body: Buffer | Readable, about: { contentType: string }): Promise<FileHead>;
  /** The file as a stream. Throws `FileMissing` when there is none. */
  get(key: string): Promise<Readable>;
  /** What is known of the file, or null when there is none. */
  head(key: string): Promise<FileHead | null>;
  /** Removes the file; a missing one is not an error. */
  remove(key: string): Promise<void>;
}

/** There is no file under this key. The message does not repeat the key: it may name a person's record. */
export class FileMissing extends Error {
  constructor() {
    super('There is no file under this key.');
  }
}

const longestKey = 300;
const plainName = /^[A-Za-z0-9][A-Za-z0-9._-]{0,127}$/;

/**
 * A key is one to eight plain names joined by '/', so that it can never leave the store's folder or bucket.
 * @throws RangeError when it is anything else.
 */
export function checkKey(key: string): string {
  const names = key.split('/');
  if (key.length > longestKey || names.length > 8 || !names.every((name) => plainName.test(name))) {
    throw new RangeError('A file key is made of plain names joined by slashes.');
  }
  return key;
}
