import { createHash } from 'node:crypto';

/**
 * Merkle tree hashing of RFC 6962, section 2.1: a leaf is SHA-256(0x00 ‖ entry), a node SHA-256(0x01 ‖ left ‖ right).
 * A growing tree is kept as its peaks (the roots of its full subtrees, left to right), so that a seal reads new rows only.
 */
const sha256 = (...parts: readonly (Buffer | string)[]): Buffer => parts.reduce((hash, part) => hash.update(part), createHash('sha256')).digest();

const leafMark = Buffer.from([0]);
const nodeMark = Buffer.from([1]);

export const leafHash = (entry: Buffer | string): Buffer => sha256(leafMark, entry);
const nodeHash = (left: Buffer, right: Buffer): Buffer => sha256(nodeMark, left, right);

/** The tree so far: how many leaves, and the roots of its full subtrees from the left. */
export interface Tree {
  readonly size: number;
  readonly peaks: readonly Buffer[];
}

export const emptyTree: Tree = { size: 0, peaks: [] };

/** The tree with one more leaf. O(log n). */
export function append(tree: Tree, leaf: Buffer): Tree {
  const peaks = [...tree.peaks];
  let node = leaf;
  // Each trailing one-bit of the size is a full subtree that the new leaf completes.
  for (let size = tree.size; size % 2 === 1; size = (size - 1) / 2) node = nodeHash(peaks.pop() as Buffer, node);
  return { size: tree.size + 1, peaks: [...peaks, node] };
}

/** The tree head: SHA-256 of nothing for the empty tree, else the peaks folded from the right. */
export function rootOf({ peaks }: Tree): Buffer {
  return peaks.length === 0 ? sha256() : peaks.reduceRight((right, left) => nodeHash(left, right));
}
