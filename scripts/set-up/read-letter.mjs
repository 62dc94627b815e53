/** Reads what our own letters use of MIME (RFC 2045 to 2047): multiparts, base64, quoted-printable, encoded words. */

const unquote = (text) => text.replace(/^"(.*)"$/s, '$1').replace(/\\(.)/g, '$1');

/** Header lines, unfolded, under lower-case names. */
function readHeaders(block) {
  const headers = {};
  for (const line of block.replace(/\r\n[ \t]+/g, ' ').split('\r\n')) {
    const colon = line.indexOf(':');
    if (colon > 0) headers[line.slice(0, colon).toLowerCase()] = line.slice(colon + 1).trim();
  }
  return headers;
}

/** `text/plain; charset=utf-8` as its value and parameters. */
function readValue(header = '') {
  const [value, ...rest] = header.split(/;(?=(?:[^"]*"[^"]*")*[^"]*$)/);
  const parameters = rest.map((part) => part.split(/=(.*)/s)).filter(([name]) => name);
  return { value: value.trim().toLowerCase(), parameters: Object.fromEntries(parameters.map(([name, text = '']) => [name.trim().toLowerCase(), unquote(text.trim())])) };
}

function quotedPrintable(text) {
  const bytes = text.replace(/=\r?\n/g, '').replace(/=([0-9A-Fa-f]{2})/g, (_whole, code) => String.fromCharCode(parseInt(code, 16)));
  return Buffer.from(bytes, 'latin1');
}

function decodeBody(body, encoding = '7bit') {
  switch (encoding.toLowerCase()) {
    case 'base64':
      return Buffer.from(body, 'base64');
    case 'quoted-printable':
      return quotedPrintable(body);
    default:
      return Buffer.from(body, 'latin1');
  }
}

/** `=?UTF-8?Q?…?=` and `=?UTF-8?B?…?=` as text; white space between two encoded words does not count. */
export function decodeWords(text) {
  return text
    .replace(/(\?=)\s+(=\?)/g, '$1$2')
    .replace(/=\?[\w-]+\?([QBqb])\?([^?]*)\?=/g, (_whole, kind, coded) =>
      kind.toUpperCase() === 'B' ? Buffer.from(coded, 'base64').toString('utf8') : quotedPrintable(coded.replaceAll('_', ' ')).toString('utf8'),
    );
}

/** The leaves of a message: `{ type, parameters, disposition, content }`. */
function leavesOf(source) {
  const gap = source.indexOf('\r\n\r\n');
  const headers = readHeaders(gap < 0 ? source : source.slice(0, gap));
  const body = gap < 0 ? '' : source.slice(gap + 4);
  const type = readValue(headers['content-type'] ?? 'text/plain');
  if (type.value.startsWith('multipart/')) {
    const parts = `\r\n${body}`.split(`\r\n--${type.parameters.boundary}`).slice(1, -1);
    return parts.flatMap((part) => leavesOf(part.replace(/^[ \t]*\r\n/, '')));
  }
  const disposition = readValue(headers['content-disposition']);
  return [{ type: type.value, parameters: type.parameters, disposition, content: decodeBody(body, headers['content-transfer-encoding']) }];
}

/**
 * Reads a raw message.
 * @param {Buffer} raw
 * @returns subject, from, messageId, text, html and attachments with their content as base64.
 */
export function readLetter(raw) {
  const source = raw.toString('latin1');
  const headers = readHeaders(source.slice(0, source.indexOf('\r\n\r\n')));
  const leaves = leavesOf(source);
  const body = (type) => leaves.find((leaf) => leaf.type === type && leaf.disposition.value !== 'attachment')?.content.toString('utf8') ?? '';
  const attachments = leaves
    .filter((leaf) => leaf.disposition.value === 'attachment')
    .map(({ type, parameters, disposition, content }) => ({
      filename: decodeWords(disposition.parameters.filename ?? parameters.name ?? 'attachment'),
      contentType: type,
      sizeBytes: content.length,
      base64: content.toString('base64'),
    }));
  return {
    subject: decodeWords(headers.subject ?? ''),
    from: decodeWords(headers.from ?? ''),
    messageId: headers['message-id'] ?? '',
    text: body('text/plain'),
    html: body('text/html'),
    attachments,
  };
}
