import { fork, type ChildProcess } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { letterNamed } from '@/lib/mail';
import { hasDemoMailbox, listCapturedLetters, readCapturedLetter } from '@/lib/mail/demo-mailbox';
import { makeSendLetter } from '@/lib/mail/send-letter';

/** The whole way: nodemailer, SMTP, the capture's reading of MIME, its address, our reader of it. */
const folder = mkdtempSync(join(tmpdir(), 'tidemark-mail-'));
let capture: ChildProcess;
let ports: { smtpPort: number; httpPort: number };

beforeAll(async () => {
  capture = fork('scripts/mail-capture.mjs', { env: { ...process.env, MAIL_FOLDER: folder }, silent: true });
  ports = await new Promise((resolve, reject) => {
    capture.once('message', (message) => resolve(message as typeof ports));
    capture.once('exit', (code) => reject(new Error(`mail capture ended with ${code}`)));
  });
  Object.assign(process.env, { DEMO: '1', DEMO_MAILBOX_URL: `http://127.0.0.1:${ports.httpPort}` });
});

afterAll(async () => {
  const gone = new Promise((resolve) => capture.once('exit', resolve));
  capture.kill('SIGTERM');
  await gone;
  rmSync(folder, { recursive: true });
});

const send = () => makeSendLetter({ smtpUrl: `smtp://127.0.0.1:${ports.smtpPort}`, from: 'Tidemark <registry@tidemark.example>' });

it('a letter arrives whole: both bodies, long lines, letters beyond ASCII and the attachment', async () => {
  const pdf = randomBytes(50_000);
  const data = { greetingName: 'Žofie Müller–Ørsted', siteName: 'Kestrel Bay ünd søn' };
  await send()(letterNamed('consent-copy'), {
    to: 'zofie@home.example', data, id: 'job-1', attachments: [{ filename: 'copy ä.pdf', contentType: 'application/pdf', content: pdf }],
  });
  const [heading] = await listCapturedLetters('ZOFIE@home.example');
  expect(heading).toMatchObject({ subject: 'Your copy from Kestrel Bay ünd søn', to: ['zofie@home.example'] });
  const letter = await readCapturedLetter(heading?.id ?? '');
  const expected = letterNamed('consent-copy').renderRaw(data);
  expect(letter?.text.replaceAll('\r\n', '\n').trim()).toBe(expected.text.trim());
  expect(letter?.html.replaceAll('\r\n', '\n').trim()).toBe(expected.html);
  expect(letter?.attachments).toEqual([{ filename: 'copy ä.pdf', contentType: 'application/pdf', sizeBytes: 50_000 }]);
  const file = await fetch(`http://127.0.0.1:${ports.httpPort}/letters/${heading?.id}/files/0`);
  expect(Buffer.from(await file.arrayBuffer()).equals(pdf)).toBe(true);
});

it('a letter sent twice by a retried job is kept once', async () => {
  const posting = { to: 'twice@home.example', data: { url: 'https://registry.example/password/x', validMinutes: 60 }, id: 'job-2' };
  await send()(letterNamed('password-reset'), posting);
  await send()(letterNamed('password-reset'), posting);
  expect(await listCapturedLetters('twice@home.example')).toHaveLength(1);
  expect(readdirSync(folder).filter((name) => name.endsWith('.json')).length).toBeGreaterThan(0);
});

it('an address with a comma reaches no second person', async () => {
  const data = { url: 'https://registry.example/password/y', validMinutes: 60 };
  await send()(letterNamed('password-reset'), { to: 'one@home.example, two@home.example', data, id: 'job-3' }).catch(() => 'refused');
  expect(await listCapturedLetters('two@home.example')).toEqual([]);
});

it('a mail server that does not answer is an error, so that the job is tried again', async () => {
  const nowhere = makeSendLetter({ smtpUrl: 'smtp://127.0.0.1:1', from: 'registry@tidemark.example' });
  await expect(nowhere(letterNamed('password-reset'), { to: 'a@home.example', data: { url: 'https://a.example', validMinutes: 1 }, id: 'x' })).rejects.toThrow();
});

it('the mailbox answers to its own address only, and exists in the demonstration only', async () => {
  const port = ports.httpPort;
  const { request } = await import('node:http');
  const status = await new Promise((resolve, reject) => {
    request({ host: '127.0.0.1', port, path: '/letters', headers: { host: 'evil.example' } }, (answer) => resolve(answer.statusCode)).once('error', reject).end();
  });
  expect(status).toBe(403);
  expect(await readCapturedLetter('no-such-letter')).toBeNull();
  process.env['DEMO'] = '0';
  expect(hasDemoMailbox()).toBe(false);
  await expect(listCapturedLetters()).rejects.toThrow('outside the demonstration');
  process.env['DEMO'] = '1';
});
