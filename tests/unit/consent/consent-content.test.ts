import { expect, test } from 'vitest';
import { contentHash } from '@/lib/consent/consent-content';
import { signatureMade } from '@/lib/consent/input';

const form = { title: 'T', sections: [{ key: 'a', title: 'A', paragraphs: ['Words.'] }], statements: [{ key: 's', text: 'S' }], permissions: [{ key: 'p', text: 'P' }] };

test('one content has one hash, however its keys were stored', () => {
  const stored = JSON.parse('{"permissions":[{"text":"P","key":"p"}],"statements":[{"text":"S","key":"s"}],"sections":[{"title":"A","paragraphs":["Words."],"key":"a"}],"title":"T"}') as typeof form;
  expect(contentHash({ formNumber: '1.0', form: stored, permissions: { p: 'yes' } })).toBe(contentHash({ formNumber: '1.0', form, permissions: { p: 'yes' } }));
});

test('the hash of a small content is SHA-256 of its canonical text', () => {
  // printf '{"form":{},"formNumber":"1","permissions":{}}' | sha256sum
  expect(contentHash({ formNumber: '1', form: {} as typeof form, permissions: {} })).toBe('99ab01427056c5522836e5584cc51c1626f9efdfb60ea6747b53acefd5da6d17');
});

test('another word, another answer or another number is another hash', () => {
  const first = contentHash({ formNumber: '1.0', form, permissions: { p: 'yes' } });
  expect(contentHash({ formNumber: '1.0', form, permissions: { p: 'no' } })).not.toBe(first);
  expect(contentHash({ formNumber: '1.1', form, permissions: { p: 'yes' } })).not.toBe(first);
  expect(contentHash({ formNumber: '1.0', form: { ...form, title: 'T.' }, permissions: { p: 'yes' } })).not.toBe(first);
});

test('a drawing is moves and lines and nothing else', () => {
  const drawn = (path: string) => signatureMade.safeParse({ kind: 'drawn', path, width: 300, height: 100 }).success;
  expect(drawn('M1.0 2.0L43.5 4.0L5.0 6.0M7.0 8.0L9.0 1.0')).toBe(true);
  expect(drawn('M1 2"/><script>')).toBe(false);
  expect(drawn('')).toBe(false);
});
