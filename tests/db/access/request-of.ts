import { randomUUID } from 'node:crypto';
import type { Sample } from './samples';

/** The request a page would send to an address with these parameters, query and body, and what the router adds. */
export function requestOf({ address, method }: { address: string; method: string }, sample: Sample): [Request, { params: Promise<Record<string, string> | undefined> }] {
  const path = address.replace(/\{(\w+)\}/g, (_, name: string) => encodeURIComponent(sample.params?.[name] ?? ''));
  const url = new URL(path, 'http://127.0.0.1:3000');
  for (const [name, value] of Object.entries(sample.query ?? {})) url.searchParams.set(name, value);
  const headers = { origin: 'http://127.0.0.1:3000', 'idempotency-key': randomUUID(), 'if-match': '"v1"', 'content-type': 'application/json' };
  const body = method === 'GET' ? {} : { body: JSON.stringify(sample.body ?? {}) };
  return [new Request(url, { method, headers, ...body }), { params: Promise.resolve(sample.params) }];
}
