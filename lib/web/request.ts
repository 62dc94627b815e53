import 'server-only';
import { createHash, randomUUID } from 'node:crypto';
import { sourceOf } from '@/lib/auth/source';
import { env } from '@/lib/env';
import { Refusal } from '@/lib/work/refusal';
import { unkeepableText } from '@/lib/work/unkeepable';

/** JSON bodies are small: a limb form is 2 kB, a signature at most 60 kB. */
const bodyLimitBytes = 262_144;

/** A reference that the answer, the audit trail and the log share. */
export const newReference = (): string => randomUUID();

/** Where a request came from, as far as our own proxies vouch for it. */
export const originOf = (request: Request): string => sourceOf(request.headers.get('x-forwarded-for'));

/** Only our own pages may write: another site's form or script is refused. */
export function requireOwnOrigin(request: Request): void {
  if (request.method === 'GET' || request.method === 'HEAD') return;
  const origin = request.headers.get('origin');
  const own = origin === null ? request.headers.get('sec-fetch-site') === 'same-origin' : origin === new URL(env().NEXTAUTH_URL).origin;
  if (!own) throw new Refusal('forbidden', 'This request did not come from a page of Tidemark.');
}

/** A null character ends the data base's own messages, half a surrogate pair is no text: neither is taken in. */
function keepable(name: string, value: unknown): unknown {
  if (typeof value === 'string' && /\0|\p{Surrogate}/u.test(value))
    throw new Refusal('invalid', unkeepableText, name);
  return value;
}

/** The JSON body, counted while it is read. */
export async function readJson(request: Request): Promise<unknown> {
  if (request.method === 'GET' || request.method === 'HEAD') return {};
  if (!request.body) return {};
  const chunks: Uint8Array[] = [];
  let bytes = 0;
  for await (const chunk of request.body as unknown as AsyncIterable<Uint8Array>) {
    bytes += chunk.byteLength;
    if (bytes > bodyLimitBytes) throw new Refusal('too-large', 'That is more than this form can hold (256 kB).');
    chunks.push(chunk);
  }
  if (bytes === 0) return {};
  try {
    return JSON.parse(Buffer.concat(chunks).toString('utf8'), keepable);
  } catch (error) {
    if (error instanceof Refusal) throw error;
    throw new Refusal('invalid', 'The request is not valid JSON.');
  }
}

/** What the request asks for: path parameters, the query of a GET, the body of a write. */
export async function readInput(request: Request, params: Record<string, string | string[]> = {}): Promise<Record<string, unknown>> {
  const query = Object.fromEntries(new URL(request.url).searchParams);
  for (const [name, value] of [...Object.entries(query), ...Object.entries(params)]) keepable(name, value);
  const body = await readJson(request);
  if (typeof body !== 'object' || body === null || Array.isArray(body)) throw new Refusal('invalid', 'The request holds no fields.');
  return request.method === 'GET' || request.method === 'HEAD' ? { ...query, ...params } : { ...body, ...params };
}

/** The version in If-Match: '"v3"' is 3. */
export function expectedVersion(request: Request): number {
  const match = /^"v(\d{1,9})"$/.exec(request.headers.get('if-match') ?? '');
  if (!match) throw new Refusal('precondition-required', 'Say which version you saw (If-Match), so that nobody’s work is overwritten.');
  return Number(match[1]);
}

/** The key under which a create happens once, however often it is sent. */
export function idempotencyKey(request: Request): string {
  const key = request.headers.get('idempotency-key') ?? '';
  if (!/^[\w-]{16,80}$/.test(key)) throw new Refusal('precondition-required', 'A create needs an Idempotency-Key of 16 to 80 letters and digits.');
  return key;
}

/** Tells one request from another under the same key. */
export const requestHash = (path: string, input: unknown): string =>
  createHash('sha256').update(path).update('\n').update(JSON.stringify(input)).digest('hex');
