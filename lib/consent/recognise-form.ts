import { Refusal } from '@/lib/work/refusal';
import { isWholeJpeg } from './whole-jpeg';
import { judgePdf, type PdfJudgement } from './whole-pdf';
import { isWholePng } from './whole-png';

/** What a signed form may be. */
export const formTypes = ['application/pdf', 'image/jpeg', 'image/png'] as const;

/** A form as it was recognised. */
export interface FormFile {
  readonly contentType: (typeof formTypes)[number];
  readonly extension: 'pdf' | 'jpg' | 'png';
}

const latin = (content: Buffer, from: number, to: number): string => content.subarray(Math.max(0, from), to).toString('latin1');

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

const notWhole = (kind: string): string => `This begins like a ${kind} but is not a whole one. Open it to check it, then send it again.`;
const notAPicture = (kind: string): string => `This begins like a ${kind} but is not a whole one of at most 40 megapixels with nothing after its end. Open it to check it, save it anew, then send it again.`;

/** Why a PDF is not taken; null for one that is. */
const pdfSentences: Readonly<Record<PdfJudgement, string | null>> = {
  whole: null,
  broken: notWhole('PDF'),
  working: 'This PDF does more than show pages: it holds a script, an action or another file. Print the form to a new PDF, or photograph it.',
  hidden: 'This PDF is locked, or packed in a way that cannot be looked into. Print the form to a new PDF, or photograph it.',
};

/**
 * What the content is, by its own bytes; its name and what the browser says of it do not count.
 * @throws Refusal 'invalid' that names what it is when it is no PDF, JPEG or PNG, is cut off, or holds more than pages.
 */
export async function recogniseForm(content: Buffer): Promise<FormFile> {
  if (content.length === 0) throw new Refusal('invalid', `The file is empty. ${ways}`, 'file');
  const taken = (refused: string | null, file: FormFile): FormFile => {
    if (refused === null) return file;
    throw new Refusal('invalid', refused, 'file');
  };
  if (content.subarray(0, 5).toString('latin1') === '%PDF-') return taken(pdfSentences[judgePdf(content)], { contentType: 'application/pdf', extension: 'pdf' });
  if (content.subarray(0, 3).equals(Buffer.from([0xff, 0xd8, 0xff]))) return taken(isWholeJpeg(content) ? null : notAPicture('JPEG picture'), { contentType: 'image/jpeg', extension: 'jpg' });
  if (content.subarray(0, 8).equals(Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a])))
    return taken((await isWholePng(content)) ? null : notAPicture('PNG picture'), { contentType: 'image/png', extension: 'png' });
  throw new Refusal('invalid', `This is ${nameOf(content)}. ${ways}`, 'file');
}
