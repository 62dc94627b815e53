import { randomBytes } from 'node:crypto';
import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { buffer } from 'node:stream/consumers';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { FileMissing, makeStorage, type Storage } from '@/lib/storage';
import { checkKey } from '@/lib/storage/storage';
import { startS3Fake, type S3Fake } from '../../../s3-fake';

const folder = mkdtempSync(join(tmpdir(), 'tidemark-storage-'));
let fake: S3Fake;

beforeAll(async () => {
  fake = await startS3Fake();
});

afterAll(async () => {
  await fake.stop();
  rmSync(folder, { recursive: true });
});

const stores: [string, () => Storage][] = [
  ['a folder', () => makeStorage({ kind: 'folder', path: folder })],
  ['a bucket', () => makeStorage({ kind: 's3', endpoint: fake.endpoint, region: 'us-east-1', bucket: 'files', accessKeyId: 'id', secretAccessKey: 'key' })],
];

describe.each(stores)('files kept in %s', (_name, open) => {
  it('come back byte for byte with their type', async () => {
    const store = open();
    const content = randomBytes(300_000);
    expect(await store.put('consent/one/signed.pdf', content, { contentType: 'application/pdf' })).toEqual({ sizeBytes: 300_000, contentType: 'application/pdf' });
    expect((await buffer(await store.get('consent/one/signed.pdf'))).equals(content)).toBe(true);
    expect(await store.head('consent/one/signed.pdf')).toEqual({ sizeBytes: 300_000, contentType: 'application/pdf' });
  });

  it('may arrive as a stream and replace an earlier file', async () => {
    const store = open();
    await store.put('extract/a.csv', Buffer.from('old'), { contentType: 'text/plain' });
    await store.put('extract/a.csv', Readable.from([Buffer.from('code,'), Buffer.from('volume\n')]), { contentType: 'text/csv' });
    expect((await buffer(await store.get('extract/a.csv'))).toString()).toBe('code,volume\n');
    expect(await store.head('extract/a.csv')).toEqual({ sizeBytes: 12, contentType: 'text/csv' });
  });

  it('are missing when never kept or removed, and removing twice is no error', async () => {
    const store = open();
    await store.put('gone.txt', Buffer.from('x'), { contentType: 'text/plain' });
    await store.remove('gone.txt');
    await store.remove('gone.txt');
    expect(await store.head('gone.txt')).toBeNull();
    await expect(store.get('gone.txt')).rejects.toBeInstanceOf(FileMissing);
  });

  it('leave the earlier file whole when the new one breaks off', async () => {
    const store = open();
    await store.put('kept.txt', Buffer.from('whole'), { contentType: 'text/plain' });
    const breaking = Readable.from(
      (async function* () {
        yield Buffer.from('half');
        throw new Error('connection lost');
      })(),
    );
    await expect(store.put('kept.txt', breaking, { contentType: 'text/plain' })).rejects.toThrow('connection lost');
    expect((await buffer(await store.get('kept.txt'))).toString()).toBe('whole');
  });

  it.each(['../outside', '/etc/passwd', 'a//b', 'a/../b', '.hidden', 'a\0b', 'a\\b', '', 'a/'])('refuse the key %j', async (key) => {
    await expect(open().put(key, Buffer.from('x'), { contentType: 'text/plain' })).rejects.toBeInstanceOf(RangeError);
    await expect(open().get(key)).rejects.toBeInstanceOf(RangeError);
  });
});

it('the folder keeps no half-arrived file behind', () => {
  expect(readdirSync(join(folder, 'arriving'))).toEqual([]);
});

it('a key of nine names is one too many', () => {
  expect(checkKey('a/b/c/d/e/f/g/h')).toBe('a/b/c/d/e/f/g/h');
  expect(() => checkKey('a/b/c/d/e/f/g/h/i')).toThrow(RangeError);
});
