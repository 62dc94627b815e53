import { crc32 } from 'node:zlib';
import { Refusal } from '@/lib/work/refusal';

/** What a signed form may be. */
export const formTypes = ['application/pdf', 'image/jpeg', 'image/png'] as const;

/** A form as it was recognised. */
export interface FormFile {
  readonly contentType: (typeof formTypes)[number];
  readonly extension: 'pdf' | 'jpg' | 'png';
}

const latin = (content: Buffer, from: number, to: number): string => content.subarray(Math.max(0, from), to).toString('latin1');

/** ISO 32000-1, 7.5: the header stands first; the end carries where the cross-references start. */
function isWholePdf(content: Buffer): boolean {
  const foot = latin(content, content.length - 2048, content.length);
  return /^%PDF-[12]\.\d/.test(latin(content, 0, 8)) && /startxref\s+\d+\s+%%EOF/.test(foot);
}

/** ITU-T T.81, B.1: marker segments up to the scan, a frame with a size, an end marker after it. */
function isWholeJpeg(content: Buffer): boolean {
  let at = 2;
  let framed = false;
  while (at + 4 <= content.length) {
    if (content[at] !== 0xff) return false;
    const marker = content[at + 1] ?? 0;
    if (marker === 0xff) {
      at += 1;
      continue;
    }
    const length = content.readUInt16BE(at + 2);
    if (length < 2) return false;
    const isFrame = marker >= 0xc0 && marker <= 0xcf && ![0xc4, 0xc8, 0xcc].includes(marker);
    if (isFrame && at + 9 <= content.length) framed = content.readUInt16BE(at + 5) > 0 && content.readUInt16BE(at + 7) > 0;
    if (marker === 0xda) return framed && content.indexOf(Buffer.from([0xff, 0xd9]), at + 2 + length) > 0;
    at += 2 + length;
  }
  return false;
}

/** PNG (ISO/IEC 15948), 5: chunks of length, type, data and checksum, from IHDR through IDAT to IEND. */
function isWholePng(content: Buffer): boolean {
  let at = 8;
  const seen: string[] = [];
  while (at + 12 <= content.length) {
    const length = content.readUInt32BE(at);
    const end = at + 8 + length;
    if (end + 4 > content.length) return false;
    const type = latin(content, at + 4, at + 8);
    if (crc32(content.subarray(at + 4, end)) !== content.readUInt32BE(end)) return false;
    if (seen.length === 0 && type !== 'IHDR') return false;
    seen.push(type);
    if (type === 'IEND') return seen.includes('IDAT');
    at = end + 4;
  }
  return false;
}

/** First bytes of what is sent by mistake or on purpose, in words a person knows. */
const others: readonly [RegExp, string][] = [
  [/^MZ/, 'a Windows program'],
  [/^\x7fELF/, 'a program'],
  [/^#!/, 'a script'],
  [/^PK\x03\x04[\s\S]*(word\/|\[Content_Types\])/, 'an Office document'],
  [/^PK\x03\x04/, 'a ZIP archive'],
  [/^\xd0\xcf\x11\xe0/, 'an older Office document'],
  [/^GIF8/, 'a GIF picture'],
  [/^RIFF[\s\S]{4}WEBP/, 'a WebP picture'],
  [/^[\s\S]{4}ftyp(heic|heix|mif1|msf1)/, 'a HEIC picture, as some phones take them'],
  [/^[\s\S]{4}ftyp/, 'a video'],
  [/^(II\*\0|MM\0\*)/, 'a TIFF picture'],
  [/^BM/, 'a bitmap picture'],
  [/^%!PS/, 'a PostScript file'],
  [/^\s*<\?xml[\s\S]*<svg|^\s*<svg/i, 'an SVG drawing'],
  [/^\s*(<!doctype html|<html|<script)/i, 'a web page'],
  [/^\{\\rtf/, 'a text document'],
];

const ways = 'Send a PDF, or a photograph of the form as JPEG or PNG.';

function nameOf(content: Buffer): string {
  const head = latin(content, 0, 4096);
  const known = others.find(([pattern]) => pattern.test(head));
  if (known) return known[1];
  return /^[\t\n\r\x20-\x7e\x80-\xff]+$/.test(head) ? 'a text file' : 'a file of a kind we do not know';
}

/**
 * What the content is, by its own bytes; its name and what the browser says of it do not count.
 * @throws Refusal 'invalid' that names what it is when it is no PDF, JPEG or PNG, or is cut off.
 */
export function recogniseForm(content: Buffer): FormFile {
  if (content.length === 0) throw new Refusal('invalid', `The file is empty. ${ways}`, 'file');
  const whole = (kind: string, ok: boolean, file: FormFile): FormFile => {
    if (ok) return file;
    throw new Refusal('invalid', `This begins like a ${kind} but is not a whole one. Open it to check it, then send it again.`, 'file');
  };
  if (content.subarray(0, 5).toString('latin1') === '%PDF-') return whole('PDF', isWholePdf(content), { contentType: 'application/pdf', extension: 'pdf' });
  if (content.subarray(0, 3).equals(Buffer.from([0xff, 0xd8, 0xff]))) return whole('JPEG picture', isWholeJpeg(content), { contentType: 'image/jpeg', extension: 'jpg' });
  if (content.subarray(0, 8).equals(Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a])))
    return whole('PNG picture', isWholePng(content), { contentType: 'image/png', extension: 'png' });
  throw new Refusal('invalid', `This is ${nameOf(content)}. ${ways}`, 'file');
}
