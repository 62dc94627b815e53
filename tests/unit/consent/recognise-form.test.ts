import { expect, test } from 'vitest';
import { recogniseForm } from '@/lib/consent/recognise-form';
import { onePagePdf, onePixelJpeg, onePixelPng } from '../../forms';

test.each([
  ['application/pdf', onePagePdf],
  ['image/jpeg', onePixelJpeg],
  ['image/png', onePixelPng],
])('%s is taken by its content', (contentType, content) => {
  expect(recogniseForm(content).contentType).toBe(contentType);
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
])('the refusal names %s', (name, content) => {
  expect(() => recogniseForm(content)).toThrow(`This is ${name}. Send a PDF, or a photograph of the form as JPEG or PNG.`);
});

test('an empty file is refused as empty', () => {
  expect(() => recogniseForm(Buffer.alloc(0))).toThrow('The file is empty.');
});

test.each([
  ['PDF', onePagePdf.subarray(0, onePagePdf.length - 12)],
  ['PDF', latin('%PDF-1.7\n<script>alert(1)</script>')],
  ['JPEG picture', onePixelJpeg.subarray(0, onePixelJpeg.length - 2)],
  ['JPEG picture', Buffer.concat([onePixelJpeg.subarray(0, 4), latin('<script>')])],
  ['PNG picture', onePixelPng.subarray(0, onePixelPng.length - 6)],
])('a %s that is cut off or only begins like one is refused', (kind, content) => {
  expect(() => recogniseForm(content)).toThrow(`This begins like a ${kind} but is not a whole one.`);
});

test('a picture with one flipped bit in a checked chunk is refused', () => {
  const flipped = Buffer.from(onePixelPng);
  flipped[45] = (flipped[45] ?? 0) ^ 1;
  expect(() => recogniseForm(flipped)).toThrow('is not a whole one');
});
