import { crc32, deflateSync } from 'node:zlib';

/** The smallest whole files of each kind, made from their standards, for tests of uploads. */
export const pngChunk = (type: string, data: Buffer) => {
  const body = Buffer.concat([Buffer.from(type, 'latin1'), data]);
  const [length, check] = [Buffer.alloc(4), Buffer.alloc(4)];
  length.writeUInt32BE(data.length);
  check.writeUInt32BE(crc32(body));
  return Buffer.concat([length, body, check]);
};

/** A grey picture, 8 bits a pixel unless said, with what is given as its packed data (ISO/IEC 15948). */
export function greyPng({ width, height, packed, interlaced = false }: { width: number; height: number; packed: Buffer; interlaced?: boolean }) {
  const header = Buffer.from([0, 0, 0, 0, 0, 0, 0, 0, 8, 0, 0, 0, interlaced ? 1 : 0]);
  header.writeUInt32BE(width, 0);
  header.writeUInt32BE(height, 4);
  return Buffer.concat([Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]), pngChunk('IHDR', header), pngChunk('IDAT', packed), pngChunk('IEND', Buffer.alloc(0))]);
}

/** One grey pixel. */
export const onePixelPng = greyPng({ width: 1, height: 1, packed: deflateSync(Buffer.from([0, 127])) });

/** Start, application segment, frame of 1 x 1, scan, end (ITU-T T.81). */
export const onePixelJpeg = Buffer.from([
  0xff, 0xd8, 0xff, 0xe0, 0x00, 0x10, 0x4a, 0x46, 0x49, 0x46, 0x00, 0x01, 0x01, 0x00, 0x00, 0x01, 0x00, 0x01, 0x00, 0x00,
  0xff, 0xc0, 0x00, 0x0b, 0x08, 0x00, 0x01, 0x00, 0x01, 0x01, 0x01, 0x11, 0x00,
  0xff, 0xda, 0x00, 0x08, 0x01, 0x01, 0x00, 0x00, 0x3f, 0x00, 0x7f, 0xff, 0xd9,
]);

/** One empty page (ISO 32000-1), with more in its catalogue or after its page when given. */
export const pdfWith = ({ catalogue = '', objects = '' }: { catalogue?: string; objects?: string } = {}) => Buffer.from(
  [
    '%PDF-1.4',
    `1 0 obj <</Type/Catalog/Pages 2 0 R${catalogue}>> endobj`,
    '2 0 obj <</Type/Pages/Kids[3 0 R]/Count 1>> endobj',
    '3 0 obj <</Type/Page/Parent 2 0 R/MediaBox[0 0 200 200]>> endobj',
    ...(objects ? [objects] : []),
    'trailer <</Root 1 0 R>>',
    'startxref',
    '0',
    '%%EOF',
    '',
  ].join('\n'),
  'latin1',
);

export const onePagePdf = pdfWith();
