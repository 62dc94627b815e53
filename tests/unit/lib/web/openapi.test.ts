import { describe, expect, test, vi } from 'vitest';
import { routes } from '@/app/api/routes';
import { recogniseForm } from '@/lib/consent/recognise-form';
import { openApiOf } from '@/lib/web/openapi';
import { onePagePdf, onePixelJpeg, onePixelPng } from '../../../forms';

// Who is signed in is not asked when a document is made; its machinery needs a running server.
vi.mock('@/lib/web/session', () => ({ currentSession: () => Promise.resolve(null), sessionToken: () => Promise.resolve(null) }));

interface Body {
  required: boolean;
  description?: string;
  content: Record<string, { schema: { type?: string; maxLength?: number; properties?: Record<string, unknown>; required?: string[] } }>;
}
type Operation = { parameters: { name: string; in: string }[]; requestBody?: Body; responses: Record<string, unknown> };
const document = openApiOf(routes, { url: 'https://registry.example', version: 'test' }) as { paths: Record<string, Record<string, Operation>> };
const operations = Object.entries(document.paths).flatMap(([address, methods]) => Object.entries(methods).map(([method, operation]) => ({ name: `${method} ${address}`, address, operation })));

describe('an address that takes a file', () => {
  const upload = document.paths['/api/consents/{id}/paper']?.['post'];

  test('is described with the media types it takes and its size, not as JSON', async () => {
    const kinds = await Promise.all([onePagePdf, onePixelJpeg, onePixelPng].map(recogniseForm));
    expect(Object.keys(upload?.requestBody?.content ?? {}).toSorted()).toEqual(kinds.map(({ contentType }) => contentType).toSorted());
    // Raw bytes carry no JSON type; maxLength bounds them (OpenAPI 3.1.1, 'Working with Binary Data').
    for (const { schema } of Object.values(upload?.requestBody?.content ?? {})) expect(schema).toEqual({ maxLength: 10_000_000 });
    expect(upload?.requestBody).toMatchObject({ required: true, description: expect.stringContaining('10000000 bytes') as string });
  });

  test('answers 201, and its id stands in the address', () => {
    expect(Object.keys(upload?.responses ?? {})).toEqual(['201', 'default']);
    expect(upload?.parameters.map(({ name, in: where }) => [name, where])).toEqual([['id', 'path']]);
  });
});

test('every other write takes JSON, and its body does not ask again for what stands in the address', () => {
  const writes = operations.filter(({ operation, name }) => operation.requestBody && !name.endsWith('/paper'));
  expect(writes.length).toBeGreaterThan(30);
  for (const { name, address, operation } of writes) {
    const content = operation.requestBody?.content ?? {};
    expect([name, Object.keys(content)]).toEqual([name, ['application/json']]);
    const { properties = {}, required = [] } = content['application/json']?.schema ?? {};
    const inPath = [...address.matchAll(/\{(\w+)\}/g)].map(([, key]) => key as string);
    for (const key of inPath) expect([name, key in properties, required.includes(key)]).toEqual([name, false, false]);
  }
});

test('a field that may be empty says so as JSON Schema 2020-12 does', () => {
  const note = document.paths['/api/symptoms']?.['post']?.requestBody?.content['application/json']?.schema.properties?.['note'];
  expect(JSON.stringify(note)).toContain('"null"');
  expect(JSON.stringify(document)).not.toContain('"nullable"');
});

test('no two operations share a name, and each says what it answers', () => {
  const ids = operations.map(({ operation }) => (operation as unknown as { operationId: string }).operationId);
  expect(new Set(ids).size).toBe(ids.length);
  for (const { operation } of operations) expect(Object.keys(operation.responses)).toContain('default');
});
