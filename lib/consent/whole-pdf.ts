import { inflateSync } from 'node:zlib';

/** A name may be written with '#4A' for 'J' (ISO 32000-1, 7.3.5); in this shape it is looked for. */
const unescaped = (text: string): string => text.replace(/#([0-9A-Fa-f]{2})/g, (_, hex: string) => String.fromCharCode(parseInt(hex, 16)));

/** A whole name: nothing that could go on with it follows. */
const end = String.raw`(?![^\s()<>[\]{}/%])`;
/** What runs, opens or carries something else. Long enough that packed pictures do not hold them by chance. */
const working = new RegExp(`/(JavaScript|Launch|EmbeddedFiles?|RichMedia|SubmitForm|ImportData|OpenAction(?!\\s*\\[))${end}|<script|<!doctype html|<html|<iframe`, 'i');
/** Short names, looked for outside packed data only. An opening that leads to a page is an array and does nothing. */
const workingShort = new RegExp(`/(JS|AA|XFA)${end}`);
/** A password, or a scheme that we cannot read, hides what is inside. */
const locked = new RegExp(`/Encrypt${end}`);

/** All packed objects of a form together. */
const unpackedMost = 32_000_000;

export type PdfJudgement = 'whole' | 'broken' | 'working' | 'hidden';

interface Stream {
  readonly dictionary: string;
  readonly data: Buffer;
}

/** The content with its streams cut out, and the streams with what stands before each. */
function takeApart(content: Buffer, text: string): { outside: string; streams: Stream[] } {
  const begin = />>\s*stream(?:\r\n|\n|\r)/g;
  const streams: Stream[] = [];
  let outside = '';
  let at = 0;
  for (;;) {
    begin.lastIndex = at;
    const found = begin.exec(text);
    const body = begin.lastIndex;
    const stop = found ? text.indexOf('endstream', body) : -1;
    if (!found || stop < 0) return { outside: outside + text.slice(at), streams };
    const before = text.slice(at, found.index + 2);
    outside += `${before} `;
    streams.push({ dictionary: unescaped(before.slice(before.lastIndexOf(' obj') + 1)), data: content.subarray(body, stop) });
    at = stop + 'endstream'.length;
  }
}

/** What an object stream holds; null when it is packed in a way that we do not look into. */
function unpack({ dictionary, data }: Stream, bytes: number): string | null {
  const filter = /\/Filter\s*(\[[^\]]*\]|\/[^\s()<>[\]{}/%]+)/.exec(dictionary)?.[1]?.replace(/[[\]\s]/g, '') ?? '';
  if (filter === '') return /\/Filter/.test(dictionary) ? null : data.toString('latin1');
  if (filter !== '/FlateDecode' || /\/(DecodeParms|DP)\b/.test(dictionary)) return null;
  try {
    return inflateSync(data, { maxOutputLength: bytes }).toString('latin1');
  } catch (error) {
    if (error instanceof Error) return null;
    throw error;
  }
}

/** The text of all object streams: dictionaries that newer files pack away. */
function packedObjects(streams: readonly Stream[]): string | null {
  let all = '';
  for (const stream of streams.filter(({ dictionary }) => /\/ObjStm/.test(dictionary))) {
    const text = unpack(stream, unpackedMost - all.length);
    if (text === null) return null;
    all += `${text}\n`;
  }
  return all;
}

/** Header first, objects, at least one page, cross-references, and nothing after the end (ISO 32000-1, 7.5). */
function hasParts(text: string, outside: string, packed: string): boolean {
  const foot = text.slice(-2048);
  return (
    /^%PDF-[12]\.\d/.test(text) &&
    /startxref\s+\d+\s+%%EOF\s*$/.test(foot) &&
    /\d\s+\d+\s+obj\b/.test(outside) &&
    /\/Type\s*\/Pages?\b/.test(outside + packed) &&
    (/\btrailer\b/.test(outside) || /\/Type\s*\/XRef\b/.test(outside))
  );
}

/**
 * Whether a PDF is one, and only shows pages. Names are looked for as written, with escapes read, in the whole file and in
 * packed objects. It does not follow references nor draw pages: a file made to deceive one certain reader may still pass,
 * which is why a form is only ever handed out to be saved.
 */
export function judgePdf(content: Buffer): PdfJudgement {
  const text = content.toString('latin1');
  const { outside, streams } = takeApart(content, text);
  const plain = unescaped(outside);
  if (locked.test(plain)) return 'hidden';
  const packed = packedObjects(streams);
  if (packed === null) return 'hidden';
  const objects = plain + unescaped(packed);
  if (!hasParts(text, plain, unescaped(packed))) return 'broken';
  return working.test(unescaped(text)) || working.test(objects) || workingShort.test(objects) ? 'working' : 'whole';
}
