import 'server-only';
import type { z } from 'zod';
import type { Act } from '@/lib/auth/policy';
import { problemResponse } from './problem';
import { newReference, readJson, requireOwnOrigin } from './request';
import type { Declaration, RouteHandler } from './route';

/** An address whose service opens its own work, because there is no actor yet or the session itself changes. */
export interface PlainDeclaration<I extends z.ZodType<object>> {
  readonly act: Act;
  readonly summary: string;
  readonly input: I;
  receive(input: z.output<I>, request: Request): Promise<unknown>;
}

/** The wrapper for the few addresses that act on the session or join it. The service proves who asks. Everything else is made by `route`. */
export function plainRoute<I extends z.ZodType<object>>({ act, summary, input, receive }: PlainDeclaration<I>): RouteHandler {
  const handle = async (request: Request): Promise<Response> => {
    const reference = newReference();
    try {
      requireOwnOrigin(request);
      return Response.json(await receive(input.parse(await readJson(request)), request), { headers: { 'cache-control': 'no-store' } });
    } catch (error) {
      return problemResponse(error, { reference, act });
    }
  };
  const declaration: Declaration = { act, summary, input, open: true, run: () => Promise.reject(new Error('A plain address is received, not run.')) };
  return Object.assign(handle, { declaration });
}
