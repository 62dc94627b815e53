import { deflateSync } from 'node:zlib';
import { expect, test } from 'vitest';
import { recogniseForm } from '@/lib/consent/recognise-form';
import { greyPng, onePagePdf, onePixelJpeg, onePixelPng, pdfWith, pngChunk } from '../../forms';

test.each([
  ['application/pdf', onePagePdf],
  ['image/jpeg', onePixelJpeg],
  ['image/png', onePixelPng],
])('%s is taken by its content', async (contentType, content) => {
  expect((await recogniseForm(content)).contentType).toBe(contentType);
});

const latin = (text: string) => Buffer.from(text, 'latin1');

test.each([
  ['a Windows program', latin('MZ\x90\x00\x03')],
  ['a ZIP archive', latin('PK\x03\x04\x14\x00zzz')],
  ['an Office document', latin('PK\x03\x04\x14\x00[Content_Types].xml')],
  ['a GIF picture', latin('GIF89a\x01\x00')],
  ['a WebP picture', latin('RIFF\x10\x00\x00\x00WEBPVP8 ')],
  ['a HEIC picture, as some phones take them', latin('\x00\x00\x00\x18ftypheic')],
  ['a web page', latin('<!DOCTYPE html><script>alert(1)</script>')],
  ['an SVG drawing', latin('<svg xmlns="http://www.w3.org/2000/svg" onload="alert(1)"/>')],
  ['a TIFF picture', latin('II*\x00\x08\x00')],
  ['a text file', latin('I agree to everything.')],
  ['a file of a kind we do not know', Buffer.from([0, 1, 2, 3, 4, 5])],
])('the refusal names %s', async (name, content) => {
  await expect(recogniseForm(content)).rejects.toThrow(`This is ${name}. Send a PDF, or a photograph of the form as JPEG or PNG.`);
});

test('an empty file is refused as empty', async () => {
  await expect(recogniseForm(Buffer.alloc(0))).rejects.toThrow('The file is empty.');
});

test.each([
  ['PDF', onePagePdf.subarray(0, onePagePdf.length - 12)],
  ['PDF', latin('%PDF-1.7\n<script>alert(1)</script>')],
  ['JPEG picture', onePixelJpeg.subarray(0, onePixelJpeg.length - 2)],
  ['JPEG picture', Buffer.concat([onePixelJpeg.subarray(0, 4), latin('<script>')])],
  ['PNG picture', onePixelPng.subarray(0, onePixelPng.length - 6)],
])('a %s that is cut off or only begins like one is refused', async (kind, content) => {
  await expect(recogniseForm(content)).rejects.toThrow(`This begins like a ${kind} but is not a whole one`);
});

test('a picture with one flipped bit in a checked chunk is refused', async () => {
  const flipped = Buffer.from(onePixelPng);
  flipped[45] = (flipped[45] ?? 0) ^ 1;
  await expect(recogniseForm(flipped)).rejects.toThrow('is not a whole one');
});

const stream = (dictionary: string, data: Buffer): string => `9 0 obj <<${dictionary}/Length ${data.length}>> stream\n${data.toString('latin1')}\nendstream endobj`;
const packed = (text: string, dictionary = '/Type/ObjStm/N 1/First 4/Filter/FlateDecode'): string => stream(dictionary, deflateSync(latin(text)));

test('the skeleton of a PDF without an object and a page is no PDF', async () => {
  for (const text of ['%PDF-1.0 startxref 1 %%EOF', '%PDF-1.4\n1 0 obj <</Type/Catalog>> endobj\ntrailer <</Root 1 0 R>>\nstartxref\n0\n%%EOF'])
    await expect(recogniseForm(latin(text))).rejects.toThrow('This begins like a PDF but is not a whole one.');
});

test.each([
  ['a script when it opens', pdfWith({ catalogue: '/OpenAction<</S/JavaScript/JS(app.alert(1))>>' })],
  ['an action by reference', pdfWith({ catalogue: '/OpenAction 9 0 R' })],
  ['actions of a page', pdfWith({ catalogue: '/AA<</O 9 0 R>>' })],
  ['a script under an escaped name', pdfWith({ objects: '9 0 obj <</S/#4aava#53cript/J#53(x)>> endobj' })],
  ['a program that it starts', pdfWith({ objects: '9 0 obj <</S/Launch/F(calc)>> endobj' })],
  ['a file inside', pdfWith({ objects: stream('/Type/EmbeddedFile', latin('x')) })],
  ['a web page between its objects', pdfWith({ objects: '% <script>alert(1)</script>' })],
  ['a web page as a stream', pdfWith({ objects: stream('', latin('<!DOCTYPE html><p>x')) })],
  ['a script in packed objects', pdfWith({ objects: packed('9 0 <</S/JavaScript/JS(x)>>') })],
  ['a short name in packed objects', pdfWith({ objects: packed('9 0 <</AA 5 0 R>>') })],
  ['an object hidden in the body of a stream', pdfWith({ objects: stream('/Subtype/Image', latin('9 0 obj <</S/JavaScript>> endobj')) })],
])('a PDF with %s is refused', async (_what, content) => {
  await expect(recogniseForm(content)).rejects.toThrow('This PDF does more than show pages');
});

test.each([
  ['a password', pdfWith({ objects: '9 0 obj <</Filter/Standard>> endobj', catalogue: '/Encrypt 9 0 R' })],
  ['objects packed in another way', pdfWith({ objects: stream('/Type/ObjStm/Filter[/ASCIIHexDecode/FlateDecode]', latin('00')) })],
  ['objects that unpack to more than a form holds', pdfWith({ objects: packed(' '.repeat(33_000_000)) })],
])('a PDF with %s is refused as one that cannot be looked into', async (_what, content) => {
  await expect(recogniseForm(content)).rejects.toThrow('This PDF is locked, or packed in a way');
});

test.each([
  ['an opening at its first page', pdfWith({ catalogue: '/OpenAction[3 0 R/XYZ null null 0]' })],
  ['packed objects that only lay out', pdfWith({ objects: packed('9 0 <</Type/Font/BaseFont/AAAAAA+JSText>>') })],
  ['a packed picture that holds a short name by chance', pdfWith({ objects: stream('/Subtype/Image', latin('\x00/JS \x01/AA \xff')) })],
])('a PDF with %s is taken', async (_what, content) => {
  expect(await recogniseForm(content)).toMatchObject({ contentType: 'application/pdf' });
});

test('what follows the end of a file is refused', async () => {
  const page = latin('<html><script>alert(1)</script>');
  for (const [kind, content] of [['PDF', onePagePdf], ['JPEG picture', onePixelJpeg], ['PNG picture', onePixelPng]] as const)
    await expect(recogniseForm(Buffer.concat([content, page]))).rejects.toThrow(`This begins like a ${kind} but is not a whole one`);
});

test('further pictures behind the first, as cameras add them, are taken', async () => {
  expect(await recogniseForm(Buffer.concat([onePixelJpeg, onePixelJpeg]))).toMatchObject({ contentType: 'image/jpeg' });
});

const grey = (width: number, height: number) => deflateSync(Buffer.alloc(height * (1 + width)));

test.each([
  ['no pixel', greyPng({ width: 0, height: 0, packed: deflateSync(Buffer.alloc(0)) })],
  ['data that does not unpack', greyPng({ width: 1, height: 1, packed: latin('garbage') })],
  ['a side of 65,500', greyPng({ width: 65_500, height: 65_500, packed: grey(1, 1) })],
  ['more than 40 megapixels', greyPng({ width: 8_000, height: 5_001, packed: grey(1, 1) })],
  ['less data than its size', greyPng({ width: 3, height: 3, packed: grey(3, 2) })],
  ['more data than its size', greyPng({ width: 3, height: 3, packed: grey(3, 4) })],
  ['something behind its packed data', greyPng({ width: 3, height: 3, packed: Buffer.concat([grey(3, 3), latin('<script>')]) })],
  ['a chunk between its data', Buffer.concat([greyPng({ width: 1, height: 1, packed: grey(1, 1) }).subarray(0, -12), pngChunk('tEXt', latin('x')), pngChunk('IDAT', Buffer.alloc(0)), pngChunk('IEND', Buffer.alloc(0))])],
])('a PNG with %s is refused', async (_what, content) => {
  await expect(recogniseForm(content)).rejects.toThrow('This begins like a PNG picture but is not a whole one');
});

test('an interlaced picture unpacks to the sum of its passes', async () => {
  // 3 × 3 by the passes of the standard: 1×1, 0, 0, 1×1, 2×1 in row 2, 1×2 in column 1, 3×1 in row 1; each line one byte more.
  const bytes = 2 + 2 + 3 + 2 * 2 + 4;
  expect(await recogniseForm(greyPng({ width: 3, height: 3, interlaced: true, packed: deflateSync(Buffer.alloc(bytes)) }))).toMatchObject({ contentType: 'image/png' });
  await expect(recogniseForm(greyPng({ width: 3, height: 3, interlaced: true, packed: deflateSync(Buffer.alloc(bytes - 1)) }))).rejects.toThrow('not a whole one');
});

test('a JPEG of 65,500 by 65,500 is refused, and one whose scan never ends', async () => {
  const bomb = Buffer.from(onePixelJpeg);
  const frame = bomb.indexOf(Buffer.from([0xff, 0xc0]));
  bomb.writeUInt16BE(65_500, frame + 5);
  bomb.writeUInt16BE(65_500, frame + 7);
  await expect(recogniseForm(bomb)).rejects.toThrow('not a whole one');
  await expect(recogniseForm(Buffer.concat([onePixelJpeg.subarray(0, -2), Buffer.from([0xff, 0x00, 0xff, 0xd0])]))).rejects.toThrow('not a whole one');
});
