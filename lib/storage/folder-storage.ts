import { randomUUID } from 'node:crypto';
import { createReadStream, createWriteStream } from 'node:fs';
import { mkdir, open, readFile, rename, rm, stat, writeFile } from 'node:fs/promises';
import { dirname, join, resolve } from 'node:path';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { checkKey, FileMissing, type FileHead, type Storage } from './storage';

function isMissing(error: unknown): boolean {
  return error instanceof Error && 'code' in error && error.code === 'ENOENT';
}

/**
 * Files in a folder, for one machine. Content is written aside, flushed to disk and renamed, so a reader sees the old
 * file or the new one and never a part. The content type stands in a second tree, under the same key.
 */
export function folderStorage(folder: string): Storage {
  const base = resolve(folder);
  const contentPath = (key: string) => join(base, 'content', checkKey(key));
  const typePath = (key: string) => join(base, 'types', checkKey(key));

  async function writeAside(body: Buffer | Readable): Promise<string> {
    const aside = join(base, 'arriving', randomUUID());
    await mkdir(dirname(aside), { recursive: true, mode: 0o700 });
    try {
      await pipeline(Buffer.isBuffer(body) ? Readable.from([body]) : body, createWriteStream(aside, { mode: 0o600 }));
      const file = await open(aside, 'r');
      await file.sync().finally(() => file.close());
      return aside;
    } catch (error) {
      await rm(aside, { force: true });
      throw error;
    }
  }

  async function head(key: string): Promise<FileHead | null> {
    try {
      const [{ size }, contentType] = await Promise.all([stat(contentPath(key)), readFile(typePath(key), 'utf8')]);
      return { sizeBytes: size, contentType };
    } catch (error) {
      if (isMissing(error)) return null;
      throw error;
    }
  }

  return {
    head,
    async put(key, body, { contentType }) {
      const [content, type] = [contentPath(key), typePath(key)];
      const aside = await writeAside(body);
      await mkdir(dirname(content), { recursive: true, mode: 0o700 });
      await mkdir(dirname(type), { recursive: true, mode: 0o700 });
      await writeFile(type, contentType, { mode: 0o600 });
      await rename(aside, content);
      return { sizeBytes: (await stat(content)).size, contentType };
    },
    async get(key) {
      if (!(await head(key))) throw new FileMissing();
      return createReadStream(contentPath(key));
    },
    async remove(key) {
      await rm(contentPath(key), { force: true });
      await rm(typePath(key), { force: true });
    },
  };
}
