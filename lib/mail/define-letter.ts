import type { z } from 'zod';

/** A letter by e-mail: it names no diagnosis, no study and no measured value, because anyone may look at an inbox. */
export interface Letter<D extends object> {
  readonly name: string;
  readonly data: z.ZodType<D>;
  readonly example: D;
  subject(data: D): string;
  text(data: D): string;
  /** The body inside the common frame; every value in it goes through `html` or `escapeHtml`. */
  html(data: D): string;
}

export interface RenderedLetter {
  subject: string;
  text: string;
  html: string;
}

/** A letter of the registry whose data type is known to itself only. */
export interface AnyLetter {
  readonly name: string;
  readonly exampleRaw: object;
  /** Renders data of unknown origin. Throws ZodError when it is not what the letter takes. */
  renderRaw(data: unknown): RenderedLetter;
}

const frame = (title: string, body: string) =>
  `<!doctype html><html lang="en"><head><meta charset="utf-8"><title>${title}</title></head>` +
  '<body style="margin:0;padding:24px;background:#ffffff;color:#1c2b33;font:16px/1.5 system-ui,sans-serif">' +
  `<div style="max-width:34rem;margin:0 auto">${body}` +
  '<p style="margin-top:32px;color:#52636c;font-size:14px">Tidemark, a research registry. Nobody reads answers to this address. ' +
  'If your health worries you, call your clinic or your local emergency number.</p></div></body></html>';

const footer =
  '\n\n--\nTidemark, a research registry. Nobody reads answers to this address.\n' +
  'If your health worries you, call your clinic or your local emergency number.\n';

/** Defines a letter with the example that its test and its preview use. */
export function defineLetter<D extends object>(letter: Letter<D>): Letter<D> & AnyLetter {
  const render = (data: D): RenderedLetter => {
    const subject = oneLine(letter.subject(data));
    return { subject, text: letter.text(data).trim() + footer, html: frame(escapeHtml(subject), letter.html(data)) };
  };
  return {
    ...letter,
    subject: letter.subject,
    text: letter.text,
    html: letter.html,
    exampleRaw: letter.example,
    renderRaw: (data) => render(letter.data.parse(data)),
  };
}

/** A line break in a subject would start a new header. */
function oneLine(text: string): string {
  return text.replace(/\s+/g, ' ').trim();
}

export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`);
}

/** Template tag: escapes every value put into the markup. */
export function html(markup: TemplateStringsArray, ...values: (string | number)[]): string {
  return markup.reduce((made, part, index) => made + escapeHtml(String(values[index - 1] ?? '')) + part);
}

/** A paragraph with one link that reads as a button. */
export function linkButton(url: string, label: string): string {
  return html`<p><a href="${url}" style="display:inline-block;padding:12px 20px;border-radius:6px;background:#0f5f73;color:#ffffff">${label}</a></p>
<p style="color:#52636c;font-size:14px">Or copy this address: ${url}</p>`;
}
