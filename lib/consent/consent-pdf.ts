import PDFDocument from 'pdfkit';
import { formatLong } from './long-date';
import { openFaces, splitRuns, unprintable, type Face, type Faces } from './print-words';
import type { ConsentView } from './view-consent';

/** A signature with its drawing, which views leave out. */
export interface PrintedSignature {
  readonly who: 'participant' | 'staff';
  readonly means: string;
  readonly name: string;
  readonly signedAt: Date;
  readonly contentSha256: string;
  readonly drawing: { readonly path: string; readonly width: number; readonly height: number } | null;
}

export interface ConsentPrint {
  readonly consent: Pick<ConsentView, 'id' | 'formNumber' | 'form' | 'permissions' | 'site'>;
  readonly signatures: readonly PrintedSignature[];
  readonly staffStatement: string;
}

const page = { size: 'A4' as const, margins: { top: 64, bottom: 72, left: 64, right: 64 } };
const ink = '#16211F';
const quiet = '#46514E';

type Doc = InstanceType<typeof PDFDocument>;

/** A document with the faces it is set in. */
interface Sheet {
  readonly doc: Doc;
  readonly faces: Faces;
}

interface Setting {
  readonly size?: number;
  readonly face?: Face;
  readonly color?: string;
  readonly gap?: number;
}

/** Sets a text. Where letters are missing it says so under it, with their numbers: a copy of what was signed leaves nothing out in silence. */
function words(sheet: Sheet, text: string, { size = 11, face = 'prose', color = ink, gap = 6 }: Setting = {}): void {
  const { doc, faces } = sheet;
  const { runs, missing } = splitRuns(text, face, faces.covers);
  const baseline = -faces.ascentOf(face) * size;
  runs.forEach((run, index) => doc.font(run.face).fontSize(size).fillColor(color).text(run.text, { lineGap: 3, baseline, continued: index < runs.length - 1 }));
  doc.y += gap;
  if (missing.length === 0) return;
  const numbers = missing.flatMap((piece) => [...piece]).map((letter) => `U+${(letter.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, '0')}`);
  const note = `Where ${unprintable} stands, this copy cannot print what was typed (Unicode ${numbers.join(' ')}). The electronic record holds it as typed.`;
  words(sheet, note, { size: 8.5, face: 'note', color: quiet });
}

const heading = (sheet: Sheet, text: string): void => {
  if (sheet.doc.y > sheet.doc.page.height - 150) sheet.doc.addPage();
  sheet.doc.y += 8;
  words(sheet, text, { size: 15, gap: 4 });
};

function drawSignature(doc: Doc, drawing: NonNullable<PrintedSignature['drawing']>): void {
  const scale = Math.min(200 / drawing.width, 60 / drawing.height);
  const top = doc.y;
  doc.save().translate(page.margins.left, top).scale(scale).path(drawing.path).lineWidth(2.4).lineCap('round').lineJoin('round').stroke(ink).restore();
  doc.y = top + drawing.height * scale + 4;
}

function sign(sheet: Sheet, signature: PrintedSignature, zone: string): void {
  const { doc } = sheet;
  if (doc.y > doc.page.height - 190) doc.addPage();
  words(sheet, signature.who === 'participant' ? 'Participant' : 'Person who took consent', { face: 'label', gap: 2 });
  if (signature.drawing) drawSignature(doc, signature.drawing);
  words(sheet, signature.name, { size: 13, face: signature.means === 'typed' ? 'hand' : 'prose', gap: 2 });
  const how = { typed: 'Signed by typing the name', drawn: 'Signed by hand on the screen', paper: 'Signed on paper; the site keeps the form' }[signature.means] ?? signature.means;
  words(sheet, `${how}, ${formatLong(signature.signedAt, zone)}. Meaning: ${signature.who === 'participant' ? 'consent given' : 'discussion held'}.`, { size: 10, face: 'note', color: quiet });
}

function footers({ doc, faces }: Sheet, foot: string): void {
  const { start, count } = doc.bufferedPageRange();
  for (let index = start; index < start + count; index += 1) {
    doc.switchToPage(index);
    doc.page.margins.bottom = 0;
    doc.fontSize(8.5).fillColor(quiet);
    let x = page.margins.left;
    for (const { face, text } of splitRuns(`${foot} Page ${index + 1} of ${count}.`, 'note', faces.covers).runs) {
      doc.font(face).text(text, x, doc.page.height - 48, { lineBreak: false });
      x += doc.widthOfString(text);
    }
  }
}

/** The whole form as it was read, with every choice and both signatures. Resolves to the bytes of a PDF. */
export function printConsent({ consent, signatures, staffStatement }: ConsentPrint): Promise<Buffer> {
  const doc = new PDFDocument({ ...page, bufferPages: true, lang: 'en-GB', info: { Title: consent.form.title, Author: consent.site.name } });
  const parts: Buffer[] = [];
  doc.on('data', (part: Buffer) => parts.push(part));
  const done = new Promise<Buffer>((resolve, reject) => {
    doc.on('end', () => resolve(Buffer.concat(parts)));
    doc.on('error', reject);
  });
  const sheet: Sheet = { doc, faces: openFaces(doc) };
  words(sheet, consent.form.title, { size: 22, gap: 2 });
  words(sheet, `Consent form ${consent.formNumber}. ${consent.site.name}, ${consent.site.phone}, ${consent.site.email}`, { size: 10, face: 'note', color: quiet });
  for (const { title, paragraphs } of consent.form.sections) {
    heading(sheet, title);
    for (const paragraph of paragraphs) words(sheet, paragraph);
  }
  heading(sheet, 'What was agreed');
  for (const { text } of consent.form.statements) words(sheet, `• ${text}`);
  if (consent.form.permissions.length > 0) heading(sheet, 'What was chosen; the study goes on either way');
  for (const { key, text } of consent.form.permissions) words(sheet, `${consent.permissions[key] === 'yes' ? 'YES' : 'NO'}: ${text}`);
  heading(sheet, 'Signatures');
  for (const signature of signatures) {
    sign(sheet, signature, consent.site.timeZone);
    if (signature.who === 'staff') words(sheet, staffStatement, { size: 10, face: 'note', color: quiet });
  }
  const seal = signatures[0]?.contentSha256 ?? '';
  words(sheet, `The signatures bind to this content (SHA-256): ${seal}`, { size: 8.5, face: 'note', color: quiet });
  footers(sheet, `Consent form ${consent.formNumber}, copy for the participant.`);
  doc.end();
  return done;
}
