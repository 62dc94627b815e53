import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type PDFDocument from 'pdfkit';

type Doc = InstanceType<typeof PDFDocument>;

/** Whole faces, not the parts that screens load: a name may hold any letter. */
const files = {
  prose: 'newsreader-regular.ttf',
  hand: 'newsreader-italic.ttf',
  note: 'atkinson-hyperlegible-next-regular.ttf',
  label: 'atkinson-hyperlegible-next-bold.ttf',
  wide: 'noto-serif-regular.ttf',
} as const;
export type Face = keyof typeof files;

/** Where a word goes that its own face cannot set: Newsreader has Vietnamese, Noto Serif Greek and Cyrillic besides. */
const spare: readonly Face[] = ['prose', 'wide'];

/** Stands where no face has the letters. A box would look like a fault of the reader's machine. */
export const unprintable = '[…]';

/** A stretch of text in one face. */
export interface Run {
  readonly face: Face;
  readonly text: string;
}

/** Whether a face has a sign for every character of a piece. */
export type Covers = (face: Face, piece: string) => boolean;

const pieces = new Intl.Segmenter('en', { granularity: 'grapheme' });
/** Joiners, marks of direction and the like have no sign of their own; control characters have none at all. */
const invisible = /[\p{Default_Ignorable_Code_Point}\p{Cc}]/gu;

/**
 * Divides a text among faces: the whole in the first face that can set all of it, else word by word, else letter by letter.
 * Letters that no face has are named in `missing`. A space stays with the word before it.
 */
export function splitRuns(text: string, face: Face, covers: Covers): { runs: Run[]; missing: string[] } {
  const faces = [face, ...spare];
  const faceOf = (piece: string): Face | undefined => faces.find((candidate) => covers(candidate, piece));
  const runs: Run[] = [];
  const missing: string[] = [];
  const add = (run: Run): void => {
    const last = runs.at(-1);
    if (last?.face === run.face) runs[runs.length - 1] = { face: run.face, text: last.text + run.text };
    else runs.push(run);
  };
  const clean = text.normalize('NFC').replace(/\s+/g, ' ').replace(invisible, '');
  for (const word of faceOf(clean) ? [clean] : (clean.match(/[^ ]* ?/g) ?? [])) {
    const whole = faceOf(word);
    if (whole) {
      add({ face: whole, text: word });
      continue;
    }
    let isGap = false;
    for (const { segment } of pieces.segment(word)) {
      const found = faceOf(segment);
      if (found) add({ face: found, text: segment });
      else {
        missing.push(segment);
        if (!isGap) add({ face, text: unprintable });
      }
      isGap = found === undefined;
    }
  }
  return { runs: runs.filter((run) => run.text !== ''), missing };
}

const read = new Map<Face, Buffer>();

/** The file of a face, read once. Every process starts in the repository's root. */
function fileOf(face: Face): Buffer {
  const known = read.get(face) ?? readFileSync(join(process.cwd(), 'fonts', 'print', files[face]));
  read.set(face, known);
  return known;
}

/** What the document knows of the face it has open; its types leave it out. */
interface Opened {
  readonly _font: { readonly ascender: number; readonly font: { hasGlyphForCodePoint(codePoint: number): boolean } };
}

/** The faces as a document has them open. */
export interface Faces {
  readonly covers: Covers;
  /** From the top of a line to its baseline, as a share of the size: runs of one line share the baseline of its own face. */
  readonly ascentOf: (face: Face) => number;
}

/** Makes the faces known to a document. */
export function openFaces(doc: Doc): Faces {
  const open = (face: Face): Opened['_font'] => {
    doc.registerFont(face, fileOf(face));
    return (doc.font(face) as unknown as Opened)._font;
  };
  const opened = { prose: open('prose'), hand: open('hand'), note: open('note'), label: open('label'), wide: open('wide') } satisfies Record<Face, Opened['_font']>;
  return {
    covers: (face, piece) => [...piece].every((letter) => opened[face].font.hasGlyphForCodePoint(letter.codePointAt(0) ?? 0)),
    ascentOf: (face) => opened[face].ascender / 1000,
  };
}
