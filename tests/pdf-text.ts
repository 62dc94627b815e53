import { inflateSync } from 'node:zlib';

/** Text of a PDF as a reader copies it out, and what was drawn as the font's sign for 'no such letter'. For files that keep their objects in plain (ISO 32000-1). */
export interface PdfText {
  readonly text: string;
  readonly boxes: number;
  /** The fonts the file carries within itself. */
  readonly embedded: readonly string[];
}

/** Objects by number, as the file writes them; streams unpacked. */
function objectsOf(file: Buffer): Map<number, { dictionary: string; stream: string }> {
  const whole = file.toString('latin1');
  const found = new Map<number, { dictionary: string; stream: string }>();
  for (const match of whole.matchAll(/(?:^|\n)(\d+) 0 obj\n([\s\S]*?)\nendobj/g)) {
    const body = match[2] as string;
    const begins = body.indexOf('\nstream\n');
    const dictionary = begins < 0 ? body : body.slice(0, begins);
    const packed = begins < 0 ? '' : body.slice(begins + 8, body.lastIndexOf('\nendstream'));
    const stream = dictionary.includes('/FlateDecode') ? inflateSync(Buffer.from(packed, 'latin1')).toString('latin1') : packed;
    found.set(Number(match[1]), { dictionary, stream });
  }
  return found;
}

const utf16 = (hex: string): string => (hex.match(/[0-9a-f]{4}/gi) ?? []).map((unit) => String.fromCharCode(Number.parseInt(unit, 16))).join('');

/** Code to text, from a font's ToUnicode map. */
function lettersOf(map: string): Map<number, string> {
  const letters = new Map<number, string>();
  for (const [, from, list] of map.matchAll(/<([0-9a-f]{4})> <[0-9a-f]{4}> \[([^\]]*)\]/gi))
    (list as string).match(/<[^>]*>/g)?.forEach((entry, index) => letters.set(Number.parseInt(from as string, 16) + index, utf16(entry.replace(/[<> ]/g, ''))));
  return letters;
}

/** Reads the text of every page in the order it was drawn. */
export function pdfText(file: Buffer): PdfText {
  const objects = objectsOf(file);
  const fonts = new Map<string, Map<number, string>>();
  for (const { dictionary } of objects.values())
    for (const [, name, id] of dictionary.matchAll(/\/(F\d+) (\d+) 0 R/g)) {
      const map = /\/ToUnicode (\d+) 0 R/.exec(objects.get(Number(id))?.dictionary ?? '')?.[1];
      if (map) fonts.set(name as string, lettersOf(objects.get(Number(map))?.stream ?? ''));
    }
  let [text, boxes] = ['', 0];
  for (const { dictionary, stream } of objects.values()) {
    if (dictionary.includes('/Type') || !/\bTf\b/.test(stream)) continue;
    let font: Map<number, string> | undefined;
    for (const [, name, shown] of stream.matchAll(/\/(F\d+) [\d.]+ Tf|\[((?:<[0-9a-f]*>|[-\d. ])*)\] TJ/gi)) {
      if (name) font = fonts.get(name);
      const codes = (shown?.match(/<[^>]*>/g) ?? []).join('').replace(/[<>]/g, '').match(/.{4}/g) ?? [];
      for (const code of codes.map((hex) => Number.parseInt(hex, 16))) {
        if (code === 0) boxes += 1;
        text += font?.get(code) ?? '?';
      }
      if (shown) text += ' ';
    }
  }
  const embedded = [...objects.values()].flatMap(({ dictionary }) => (dictionary.includes('/FontFile2') ? [/\/FontName \/(?:\w+\+)?([\w-]+)/.exec(dictionary)?.[1] ?? ''] : []));
  return { text, boxes, embedded };
}
