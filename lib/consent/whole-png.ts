import { crc32, createInflate } from 'node:zlib';
import { fitsBounds } from './picture-bounds';

/** Bits a pixel takes, by colour type, and the depths each allows (ISO/IEC 15948, table 11.1). */
const colours: Readonly<Record<number, { readonly samples: number; readonly depths: readonly number[] }>> = {
  0: { samples: 1, depths: [1, 2, 4, 8, 16] },
  2: { samples: 3, depths: [8, 16] },
  3: { samples: 1, depths: [1, 2, 4, 8] },
  4: { samples: 2, depths: [8, 16] },
  6: { samples: 4, depths: [8, 16] },
};

/** Start and step of the seven passes of an interlaced picture (8.2). */
const passes = [[0, 8, 0, 8], [4, 8, 0, 8], [0, 4, 4, 8], [2, 4, 0, 4], [0, 2, 2, 4], [1, 2, 0, 2], [0, 1, 1, 2]] as const;

/** How many bytes the picture holds once unpacked, one filter byte a line; null for a header that says nothing lawful. */
function unpackedBytes(header: Buffer): number | null {
  const [width, height] = [header.readUInt32BE(0), header.readUInt32BE(4)];
  const [depth = 0, colour = -1, compression, filter, interlace = 2] = header.subarray(8);
  const kind = colours[colour];
  if (!fitsBounds(width, height) || !kind?.depths.includes(depth) || compression !== 0 || filter !== 0 || interlace > 1) return null;
  const bytes = (across: number, down: number) => (across === 0 ? 0 : down * (1 + Math.ceil((across * depth * kind.samples) / 8)));
  if (interlace === 0) return bytes(width, height);
  return passes.reduce((sum, [left, stepAcross, top, stepDown]) => sum + bytes(Math.ceil(Math.max(0, width - left) / stepAcross), Math.ceil(Math.max(0, height - top) / stepDown)), 0);
}

/** Unpacks without keeping anything, and stops at the first byte too many: exactly so much, from the whole of what is packed? */
function unpacksTo(packed: Buffer, bytes: number): Promise<boolean> {
  return new Promise((resolve) => {
    const inflate = createInflate({ chunkSize: 262_144 });
    let count = 0;
    inflate.on('data', (part: Buffer) => {
      count += part.length;
      if (count > bytes) {
        inflate.destroy();
        resolve(false);
      }
    });
    inflate.on('end', () => resolve(count === bytes && inflate.bytesWritten === packed.length));
    // Packed data that is none is an answer, not a fault.
    inflate.on('error', () => resolve(false));
    inflate.end(packed);
  });
}

interface Chunk {
  readonly type: string;
  readonly data: Buffer;
}

/** The chunks up to the end of the file, each with its checksum right; null when they do not fill it. */
function chunksOf(content: Buffer): Chunk[] | null {
  const chunks: Chunk[] = [];
  let at = 8;
  while (at + 12 <= content.length) {
    const end = at + 8 + content.readUInt32BE(at);
    if (end + 4 > content.length) return null;
    if (crc32(content.subarray(at + 4, end)) !== content.readUInt32BE(end)) return null;
    const chunk = { type: content.toString('latin1', at + 4, at + 8), data: content.subarray(at + 8, end) };
    chunks.push(chunk);
    at = end + 4;
    if (chunk.type === 'IEND') return at === content.length && chunk.data.length === 0 ? chunks : null;
  }
  return null;
}

/** PNG (ISO/IEC 15948): header, palette where it needs one, data in one run that unpacks to what the header says, end, and nothing after it. */
export async function isWholePng(content: Buffer): Promise<boolean> {
  const chunks = chunksOf(content);
  const header = chunks?.[0];
  if (!chunks || header?.type !== 'IHDR' || header.data.length !== 13) return false;
  const names = chunks.map(({ type }) => type);
  const [first, last] = [names.indexOf('IDAT'), names.lastIndexOf('IDAT')];
  if (first < 0 || names.slice(first, last + 1).some((name) => name !== 'IDAT') || names.filter((name) => name === 'IHDR').length !== 1) return false;
  if (header.data[9] === 3 && !names.slice(0, first).includes('PLTE')) return false;
  const bytes = unpackedBytes(header.data);
  return bytes !== null && unpacksTo(Buffer.concat(chunks.slice(first, last + 1).map(({ data }) => data)), bytes);
}
