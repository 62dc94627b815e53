import { createHash } from 'node:crypto';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { append, emptyTree, leafHash, rootOf } from '@/lib/audit/merkle';

// The reference inputs and roots that implementations of RFC 6962 share (Certificate Transparency's own test vectors;
// values from memory, and recomputed below by the recursive definition of section 2.1).
const inputs = ['', '00', '10', '2021', '3031', '40414243', '5051525354555657', '606162636465666768696a6b6c6d6e6f'].map((hex) => Buffer.from(hex, 'hex'));
const roots = [
  '6e340b9cffb37a989ca544e6bb780a2c78901d3fb33738768511a30617afa01d',
  'fac54203e7cc696cf0dfcb42c92a1d9dbaf70ad9e621f4bd8d98662f00e3c125',
  'aeb6bcfe274b70a14fb067a5e5578264db0fa9b51af5e0ba159158f329e06e77',
  'd37ee418976dd95753c1c73862b9398fa2a2cf9b4ff0fdfe8b30cd95209614b7',
  '4e3bbb1f7b478dcfe71fb631631519a3bca12c9aefca1612bfce4c13a86264d4',
  '76e67dadbcdf1e10e1b74ddc608abd2f98dfb16fbce75277b5232a127f2087ef',
  'ddb89be403809e325750d3d263cd78929c2942b7942a34b77e122c9594a74c8c',
  '5dc9da79a70659a9ad559cb701ded9a2ab9d823aad2f4960cfe370eff4604328',
];

const grow = (leaves: readonly Buffer[]) => leaves.reduce((tree, entry) => append(tree, leafHash(entry)), emptyTree);

/** Section 2.1, word for word: split at the largest power of two smaller than n. */
function byDefinition(entries: readonly Buffer[]): Buffer {
  if (entries.length === 0) return createHash('sha256').digest();
  if (entries.length === 1) return leafHash(entries[0] as Buffer);
  let split = 1;
  while (split * 2 < entries.length) split *= 2;
  return createHash('sha256').update(Buffer.from([1])).update(byDefinition(entries.slice(0, split))).update(byDefinition(entries.slice(split))).digest();
}

test('an empty tree has the hash of nothing', () => {
  expect(rootOf(emptyTree).toString('hex')).toBe('e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855');
});

test.each(roots.map((root, index) => [index + 1, root] as const))('%i leaves have the published root', (size, root) => {
  expect(rootOf(grow(inputs.slice(0, size))).toString('hex')).toBe(root);
});

test('growing by peaks equals the recursive definition', () => {
  fc.assert(
    fc.property(fc.array(fc.uint8Array({ maxLength: 40 }), { maxLength: 70 }), (entries) => {
      const leaves = entries.map((entry) => Buffer.from(entry));
      expect(rootOf(grow(leaves))).toEqual(byDefinition(leaves));
    }),
  );
});
