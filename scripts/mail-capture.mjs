/**
 * Takes letters over SMTP on the loopback and keeps them instead of sending them out: for demonstrations and tests.
 *
 * Environment: MAIL_FOLDER, where each letter is kept as a JSON file. As a child process it tells its parent
 * `{ smtpPort, httpPort }` and ends with it.
 *
 *   GET /letters?to=address       newest first, without bodies
 *   GET /letters/:id              whole, attachments without content
 *   GET /letters/:id/files/:n     an attachment
 */
import { randomUUID } from 'node:crypto';
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:http';
import { join } from 'node:path';
import { buffer } from 'node:stream/consumers';
import { SMTPServer } from 'smtp-server';
import { readLetter } from './set-up/read-letter.mjs';
import { dataFolder, fail, tell } from './set-up/tell.mjs';

const folder = process.env.MAIL_FOLDER ?? join(dataFolder, 'mail');
const largestLetterBytes = 20 * 1024 * 1024;

function loadLetters() {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const read = readdirSync(folder).filter((name) => name.endsWith('.json')).map((name) => JSON.parse(readFileSync(join(folder, name), 'utf8')));
  return read.sort((a, b) => (a.at < b.at ? 1 : -1));
}

const letters = loadLetters();

/** A letter sent twice has the same Message-ID: receivers drop the copy, so this one does too. */
function keep(raw, to) {
  const read = readLetter(raw);
  if (read.messageId && letters.some(({ messageId }) => messageId === read.messageId)) return;
  const letter = { id: randomUUID(), at: new Date().toISOString(), to, ...read };
  letters.unshift(letter);
  writeFileSync(join(folder, `${letter.id}.json`), JSON.stringify(letter), { mode: 0o600 });
}

const smtp = new SMTPServer({
  authOptional: true,
  disabledCommands: ['AUTH', 'STARTTLS'],
  size: largestLetterBytes,
  logger: false,
  onData(stream, session, done) {
    buffer(stream).then((raw) => {
      keep(raw, session.envelope.rcptTo.map(({ address }) => address));
      done();
    }, done);
  },
});

const heading = ({ id, at, from, to, subject }) => ({ id, at, from, to, subject });

const withoutContent = (letter) => ({
  ...heading(letter),
  text: letter.text,
  html: letter.html,
  attachments: letter.attachments.map(({ filename, contentType, sizeBytes }) => ({ filename, contentType, sizeBytes })),
});

function answer(url) {
  const [, room, id, files, index] = url.pathname.split('/');
  if (room !== 'letters') return null;
  if (!id) {
    const to = url.searchParams.get('to')?.toLowerCase();
    return { json: letters.filter((letter) => !to || letter.to.some((address) => address.toLowerCase() === to)).map(heading) };
  }
  const letter = letters.find((candidate) => candidate.id === id);
  if (!letter) return null;
  if (files === undefined) return { json: withoutContent(letter) };
  const file = files === 'files' ? letter.attachments[Number(index)] : undefined;
  return file ? { file } : null;
}

const http = createServer((request, response) => {
  // A page elsewhere could point a name of its own at the loopback: only the bare address is served.
  if (!/^127\.0\.0\.1:\d+$/.test(request.headers.host ?? '')) return response.writeHead(403).end();
  const found = request.method === 'GET' ? answer(new URL(request.url, 'http://127.0.0.1')) : null;
  if (!found) return response.writeHead(404).end();
  if (found.json) return response.writeHead(200, { 'content-type': 'application/json' }).end(JSON.stringify(found.json));
  return response.writeHead(200, { 'content-type': found.file.contentType }).end(Buffer.from(found.file.base64, 'base64'));
});

function listen(server) {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(0, '127.0.0.1', () => resolve((server.server ?? server).address().port));
  });
}

function stop() {
  http.close();
  smtp.close(() => process.exit(0));
}

async function main() {
  smtp.on('error', (error) => tell(`mail capture: ${error.message}`));
  const smtpPort = await listen(smtp);
  const httpPort = await listen(http);
  process.send?.({ smtpPort, httpPort });
  tell(`Capturing mail on smtp://127.0.0.1:${smtpPort}, letters at http://127.0.0.1:${httpPort}/letters`);
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
  process.on('disconnect', stop);
}

main().catch(fail);
