import { z } from 'zod';
import { ruleOf } from '@/lib/auth/policy';
import { problemSchema } from './problem';
import type { Declaration, RouteHandler } from './route';

/** Route modules by address: `{ '/api/queries': { POST } }`. */
export type RouteTable = Readonly<Record<string, Readonly<Record<string, RouteHandler>>>>;

const json = (schema: z.ZodType) => ({ 'application/json': { schema: z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any', target: 'openapi-3.0' }) } });

function parametersOf(address: string, method: string, declaration: Declaration): unknown[] {
  const inPath = [...address.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
  const schema = z.toJSONSchema(declaration.input, { io: 'input', unrepresentable: 'any' }) as { properties?: Record<string, unknown>; required?: string[] };
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
  const problem = { description: 'Problem details (RFC 9457).', content: { 'application/problem+json': { schema: z.toJSONSchema(problemSchema) } } };
  const done = declaration.output ? { description: 'Done.', content: json(declaration.output) } : { description: 'Done.' };
  return {
    summary: declaration.summary,
    operationId: `${method.toLowerCase()} ${address}`,
    'x-act': declaration.act,
    'x-roles': declaration.open ? ['anyone'] : ruleOf(declaration.act).roles,
    parameters: parametersOf(address, method, declaration),
    ...(method === 'GET' ? {} : { requestBody: { required: true, content: json(declaration.input) } }),
    responses: { [declaration.create ? '201' : '200']: done, default: problem },
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
