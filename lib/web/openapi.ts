import { z } from 'zod';
import { ruleOf } from '@/lib/auth/policy';
import { problemSchema } from './problem';
import type { Declaration, RouteHandler } from './route';

/** Route modules by address: `{ '/api/queries': { POST } }`. */
export type RouteTable = Readonly<Record<string, Readonly<Record<string, RouteHandler>>>>;

interface JsonSchema {
  properties?: Record<string, unknown>;
  required?: string[];
}

/** JSON Schema 2020-12, which OpenAPI 3.1 speaks; the document names the dialect for all of them. */
function schemaOf(shape: z.ZodType): JsonSchema {
  const { $schema: _dialect, ...schema } = z.toJSONSchema(shape, { io: 'input', unrepresentable: 'any' });
  return schema as JsonSchema;
}

const json = (schema: JsonSchema) => ({ 'application/json': { schema } });

const pathNames = (address: string): string[] => [...address.matchAll(/\{(\w+)\}/g)].map(([, name]) => name as string);

/** What a write takes besides what stands in its address: fields as JSON, or a file as the whole body. */
function bodyOf(address: string, { input, upload }: Declaration): Record<string, unknown> {
  if (upload) {
    // Raw bytes have no JSON type: OpenAPI 3.1.1, 'Working with Binary Data', which lets maxLength bound them.
    const content = Object.fromEntries(upload.types.map((type) => [type, { schema: { maxLength: upload.bytesMost } }]));
    return { required: true, description: `The file as the whole body, at most ${upload.bytesMost} bytes. What it is is told by its content.`, content };
  }
  const { properties, required, ...schema } = schemaOf(input);
  if (!properties) return { required: true, content: json(schema) };
  const inBody = (name: string): boolean => !pathNames(address).includes(name);
  const fields = Object.fromEntries(Object.entries(properties).filter(([name]) => inBody(name)));
  const needed = required?.filter(inBody) ?? [];
  return { required: needed.length > 0, content: json({ ...schema, properties: fields, ...(needed.length > 0 ? { required: needed } : {}) }) };
}

function parametersOf(address: string, method: string, declaration: Declaration): unknown[] {
  const inPath = pathNames(address);
  const schema = schemaOf(declaration.input);
  const named = Object.entries(schema.properties ?? {});
  const path = inPath.map((name) => ({ name, in: 'path', required: true, schema: named.find(([key]) => key === name)?.[1] ?? { type: 'string' } }));
  const query =
    method === 'GET'
      ? named
          .filter(([name]) => !inPath.includes(name))
          .map(([name, shape]) => ({ name, in: 'query', required: schema.required?.includes(name) ?? false, schema: shape }))
      : [];
  const header = (name: string, description: string) => ({ name, in: 'header', required: true, description, schema: { type: 'string' } });
  return [
    ...path,
    ...query,
    ...(declaration.create ? [header('Idempotency-Key', 'The create happens once under this key, however often it is sent.')] : []),
    ...(declaration.change ? [header('If-Match', 'The version that was seen, as in the ETag.')] : []),
  ];
}

function operationOf(address: string, method: string, declaration: Declaration): Record<string, unknown> {
  const problem = { description: 'Problem details (RFC 9457).', content: { 'application/problem+json': { schema: schemaOf(problemSchema) } } };
  const done = declaration.output ? { description: 'Done.', content: json(schemaOf(declaration.output)) } : { description: 'Done.' };
  return {
    summary: declaration.summary,
    operationId: `${method.toLowerCase()} ${address}`,
    'x-act': declaration.act,
    'x-roles': declaration.open ? ['anyone'] : ruleOf(declaration.act).roles,
    parameters: parametersOf(address, method, declaration),
    ...(method === 'GET' ? {} : { requestBody: bodyOf(address, declaration) }),
    responses: { [declaration.create || declaration.upload ? '201' : '200']: done, default: problem },
  };
}

/** The OpenAPI 3.1 document, made from the route declarations and nothing else. */
export function openApiOf(routes: RouteTable, server: { url: string; version: string }): Record<string, unknown> {
  const paths = Object.fromEntries(
    Object.entries(routes)
      .sort(([a], [b]) => a.localeCompare(b))
      .map(([address, methods]) => [
        address,
        Object.fromEntries(Object.entries(methods).map(([method, { declaration }]) => [method.toLowerCase(), operationOf(address, method, declaration)])),
      ]),
  );
  return {
    openapi: '3.1.0',
    info: { title: 'Tidemark', version: server.version, description: 'A research record. It does not diagnose and does not prescribe exercise.' },
    servers: [{ url: server.url }],
    paths,
  };
}
