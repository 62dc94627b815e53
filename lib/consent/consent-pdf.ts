import PDFDocument from 'pdfkit';
import { formatLong } from './long-date';
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

/** The document's built-in faces hold Western European letters; others lose their marks rather than turn to signs. */
const printable = (text: string): string =>
  [...text].map((letter) => (/[\x20-\x7e\xa0-\xff–—‘’“”•…]/.test(letter) ? letter : letter.normalize('NFD').replace(/[^\x20-\x7e]/g, '') || '?')).join('');

type Doc = InstanceType<typeof PDFDocument>;

function words(doc: Doc, text: string, { size = 11, font = 'Times-Roman', color = ink, gap = 6 }: { size?: number; font?: string; color?: string; gap?: number } = {}): void {
  doc.font(font).fontSize(size).fillColor(color).text(printable(text), { lineGap: 3 });
  doc.y += gap;
}

const heading = (doc: Doc, text: string): void => {
  if (doc.y > doc.page.height - 150) doc.addPage();
  doc.y += 8;
  words(doc, text, { size: 15, gap: 4 });
};

function drawSignature(doc: Doc, drawing: NonNullable<PrintedSignature['drawing']>): void {
  const scale = Math.min(200 / drawing.width, 60 / drawing.height);
  const top = doc.y;
  doc.save().translate(page.margins.left, top).scale(scale).path(drawing.path).lineWidth(2.4).lineCap('round').lineJoin('round').stroke(ink).restore();
  doc.y = top + drawing.height * scale + 4;
}

function sign(doc: Doc, signature: PrintedSignature, zone: string): void {
  if (doc.y > doc.page.height - 190) doc.addPage();
  words(doc, signature.who === 'participant' ? 'Participant' : 'Person who took consent', { font: 'Helvetica-Bold', gap: 2 });
  if (signature.drawing) drawSignature(doc, signature.drawing);
  words(doc, signature.name, { size: 13, font: signature.means === 'typed' ? 'Times-Italic' : 'Times-Roman', gap: 2 });
  const how = { typed: 'Signed by typing the name', drawn: 'Signed by hand on the screen', paper: 'Signed on paper; the site keeps the form' }[signature.means] ?? signature.means;
  words(doc, `${how}, ${formatLong(signature.signedAt, zone)}. Meaning: ${signature.who === 'participant' ? 'consent given' : 'discussion held'}.`, { size: 10, font: 'Helvetica', color: quiet });
}

function footers(doc: Doc, foot: string): void {
  const { start, count } = doc.bufferedPageRange();
  for (let index = start; index < start + count; index += 1) {
    doc.switchToPage(index);
    doc.page.margins.bottom = 0;
    doc.font('Helvetica').fontSize(8.5).fillColor(quiet);
    doc.text(printable(`${foot}   Page ${index + 1} of ${count}`), page.margins.left, doc.page.height - 48, { width: doc.page.width - 128, lineBreak: false });
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
  words(doc, consent.form.title, { size: 22, gap: 2 });
  words(doc, `Consent form ${consent.formNumber}. ${consent.site.name}, ${consent.site.phone}, ${consent.site.email}`, { size: 10, font: 'Helvetica', color: quiet });
  for (const { title, paragraphs } of consent.form.sections) {
    heading(doc, title);
    for (const paragraph of paragraphs) words(doc, paragraph);
  }
  heading(doc, 'What was agreed');
  for (const { text } of consent.form.statements) words(doc, `• ${text}`);
  if (consent.form.permissions.length > 0) heading(doc, 'What was chosen; the study goes on either way');
  for (const { key, text } of consent.form.permissions) words(doc, `${consent.permissions[key] === 'yes' ? 'YES' : 'NO'}   ${text}`);
  heading(doc, 'Signatures');
  for (const signature of signatures) {
    sign(doc, signature, consent.site.timeZone);
    if (signature.who === 'staff') words(doc, staffStatement, { size: 10, font: 'Helvetica', color: quiet });
  }
  const seal = signatures[0]?.contentSha256 ?? '';
  words(doc, `The signatures bind to this content (SHA-256): ${seal}`, { size: 8.5, font: 'Helvetica', color: quiet });
  footers(doc, `Consent form ${consent.formNumber}, copy for the participant.`);
  doc.end();
  return done;
}
